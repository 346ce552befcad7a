// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <algorithm>
#include <sstream>

#include "diagnostics/progress.hpp"

using namespace spokewright;

namespace {

ProgressState state_at(double share) {
    return {share * 150e-9, 150e-9, 20134, 1.6543, 5};
}

std::ptrdiff_t count(const std::string& text, char letter) {
    return std::count(text.begin(), text.end(), letter);
}

}  // namespace

TEST_CASE("the words of the line") {
    CHECK(progress_text(state_at(0.42), 130) ==
          " 42 %  63.0 of 150.0 ns  20134 electrons  1.65 A  mode 5  2 min 10 s left");
    CHECK(progress_text({0, 150e-9, 0, 0, 0}, -1) == "  0 %  0.0 of 150.0 ns  0 electrons  0 A  no mode");
    CHECK(progress_text(state_at(0.999), 3.4).starts_with(" 99 %"));  // 100 % is said at the end only
    CHECK(progress_text(state_at(0.5), 7384).ends_with("2 h 03 min left"));
}

TEST_CASE("a terminal is rewritten in place, five times a second at most") {
    std::ostringstream out;
    double now = 0;
    {
        Progress progress(out, true, false, [&] { return now; });
        for (int k = 0; k <= 1000; ++k) {
            now = 0.001 * k;
            progress.update(state_at(0.001 * k));
        }
    }
    CHECK(count(out.str(), '\r') <= 6);
    CHECK(count(out.str(), '\r') >= 5);
    CHECK(count(out.str(), '\n') == 1);  // the destructor leaves a fresh line
    CHECK(out.str().back() == '\n');
}

TEST_CASE("a shorter line wipes the rest of a longer one") {
    std::ostringstream out;
    double now = 0;
    Progress progress(out, true, false, [&] { return now; });
    progress.update({1e-9, 150e-9, 2000000, 1.65, 5});
    now = 1;
    progress.update({2e-9, 150e-9, 2, 1.65, 5});
    now = 2;
    progress.update({3e-9, 150e-9, 2, 1.65, 5});
    std::istringstream lines(out.str());
    std::string first, second, third, nothing;
    std::getline(lines, nothing, '\r');
    std::getline(lines, first, '\r');
    std::getline(lines, second, '\r');
    CHECK(second.size() >= first.size());
}

TEST_CASE("elsewhere a plain line each tenth, with the time left") {
    std::ostringstream out;
    double now = 0;
    Progress progress(out, false, false, [&] { return now; });
    for (int k = 0; k <= 1000; ++k) {
        now = 0.1 * k;
        progress.update(state_at(0.001 * k));
    }
    progress.finish(state_at(1));
    CHECK(count(out.str(), '\n') == 10);
    CHECK(count(out.str(), '\r') == 0);
    CHECK(out.str().starts_with(" 10 %  15.0 of 150.0 ns  20134 electrons  1.65 A  mode 5  1 min 30 s left\n"));
}

TEST_CASE("a resumed run counts the time left from where it began") {
    std::ostringstream out;
    double now = 0;
    Progress progress(out, false, false, [&] { return now; });
    progress.update(state_at(0.501));
    now = 10;
    progress.update(state_at(0.601));  // a tenth in 10 s, four tenths to go
    CHECK(out.str().ends_with("40 s left\n"));
}

TEST_CASE("quiet is quiet") {
    std::ostringstream out;
    {
        Progress progress(out, true, true, [] { return 0.0; });
        progress.update(state_at(0.5));
        progress.finish(state_at(1));
    }
    CHECK(out.str().empty());
}
