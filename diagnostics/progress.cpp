// SPDX-License-Identifier: MIT
#include "diagnostics/progress.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <ostream>

namespace spokewright {
namespace {

constexpr double kTerminalInterval = 0.2;  // s, five updates a second: smooth to the eye, free for the run

double share_of(const ProgressState& state) {
    return state.end_time > 0 ? std::clamp(state.time / state.end_time, 0.0, 1.0) : 1.0;
}

/// Full parts out of `parts`; a rounding error below a full one does not hold it back.
int parts_done(const ProgressState& state, int parts) {
    return static_cast<int>(parts * share_of(state) + 1e-9);
}

std::string duration_text(double seconds) {
    const auto whole = static_cast<std::int64_t>(std::lround(seconds));
    if (whole >= 3600) return fmt::format("{} h {:02} min", whole / 3600, whole / 60 % 60);
    if (whole >= 60) return fmt::format("{} min {:02} s", whole / 60, whole % 60);
    return fmt::format("{} s", whole);
}

}  // namespace

std::string progress_text(const ProgressState& state, double seconds_left) {
    const std::string mode = state.leading_mode > 0 ? fmt::format("mode {}", state.leading_mode) : "no mode";
    const std::string left = seconds_left < 0 ? "" : fmt::format("  {} left", duration_text(seconds_left));
    return fmt::format("{:3} %  {:.1f} of {:.1f} ns  {} electrons  {:.3g} A  {}{}", parts_done(state, 100),
                       state.time * 1e9, state.end_time * 1e9, state.electrons, state.current, mode, left);
}

double Progress::steady_seconds() {
    return std::chrono::duration<double>(std::chrono::steady_clock::now().time_since_epoch()).count();
}

Progress::Progress(std::ostream& out, bool is_terminal, bool quiet, Clock clock)
    : out_(out), is_terminal_(is_terminal), quiet_(quiet), clock_(std::move(clock)) {}

Progress::~Progress() {
    end_line();
}

void Progress::update(const ProgressState& state) {
    if (quiet_) return;
    const double share = share_of(state);
    const double now = clock_();
    if (!started_) {
        started_ = true;
        start_clock_ = now;
        start_share_ = share;
        last_print_ = now - kTerminalInterval;
        tenths_printed_ = parts_done(state, 10);
    }
    if (is_terminal_) {
        if (now - last_print_ < kTerminalInterval) return;
    } else if (parts_done(state, 10) <= tenths_printed_) {
        return;
    }
    print(state, now);
}

void Progress::finish(const ProgressState& state) {
    if (quiet_) return;
    const bool already = !is_terminal_ && parts_done(state, 10) == 10 && tenths_printed_ == 10;
    if (!already) print(state, clock_());
    end_line();
}

void Progress::print(const ProgressState& state, double now) {
    const double share = share_of(state);
    const double done = share - start_share_;
    const double left = done > 0 ? (now - start_clock_) * (1 - share) / done : -1;
    std::string text = progress_text(state, left);
    last_print_ = now;
    tenths_printed_ = parts_done(state, 10);
    if (!is_terminal_) {
        out_ << text << '\n' << std::flush;
        return;
    }
    const std::size_t length = text.size();
    if (length < width_) text.append(width_ - length, ' ');  // wipe the end of a longer line
    width_ = length;
    out_ << '\r' << text << std::flush;
    line_open_ = true;
}

void Progress::end_line() {
    if (line_open_) out_ << '\n' << std::flush;
    line_open_ = false;
}

}  // namespace spokewright
