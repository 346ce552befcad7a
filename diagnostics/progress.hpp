// SPDX-License-Identifier: MIT
// The progress line: rewritten in place on a terminal, a plain line every tenth of the way elsewhere, nothing when
// quiet.
#pragma once

#include <chrono>
#include <cstdint>
#include <functional>
#include <iosfwd>
#include <string>

namespace spokewright {

/// Where a run stands.
struct ProgressState {
    double time = 0;             // s, tube time
    double end_time = 0;         // s
    std::int64_t electrons = 0;  // macro-electrons
    double current = 0;          // A, anode
    int leading_mode = 0;        // 0 = none
};

class Progress {
public:
    using Clock = std::function<double()>;  // s, from any origin

    /// `out` must outlive this object. `clock` is replaced in tests.
    Progress(std::ostream& out, bool is_terminal, bool quiet, Clock clock = steady_seconds);
    /// Leaves a terminal on a fresh line.
    ~Progress();
    Progress(const Progress&) = delete;
    Progress& operator=(const Progress&) = delete;

    /// Cheap when it is not yet time to print: at most five times a second on a terminal.
    void update(const ProgressState& state);
    void finish(const ProgressState& state);  // the last line, whatever the time

private:
    static double steady_seconds();
    void print(const ProgressState& state, double now);
    void end_line();

    std::ostream& out_;
    bool is_terminal_;
    bool quiet_;
    Clock clock_;
    bool started_ = false;
    bool line_open_ = false;  // a terminal line stands without its end
    double start_clock_ = 0;
    double start_share_ = 0;  // a resumed run does not start at zero
    double last_print_ = 0;
    int tenths_printed_ = 0;
    std::size_t width_ = 0;
};

/// The words of the line: "42 %  63.0 of 150.0 ns  20134 electrons  1.65 A  mode 5  2 min 10 s left".
/// `seconds_left` negative = not known yet.
std::string progress_text(const ProgressState& state, double seconds_left);

}  // namespace spokewright
