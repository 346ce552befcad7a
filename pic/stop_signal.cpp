// SPDX-License-Identifier: MIT
#include "pic/stop_signal.hpp"

#include <csignal>

namespace spokewright {
namespace {

volatile std::sig_atomic_t caught = 0;

}  // namespace

void catch_stop_signals() {
    struct sigaction action {};
    action.sa_handler = [](int signal) { caught = signal; };
    action.sa_flags = static_cast<int>(SA_RESETHAND | SA_RESTART);
    sigemptyset(&action.sa_mask);
    sigaction(SIGINT, &action, nullptr);
    sigaction(SIGTERM, &action, nullptr);
}

int stop_signal() {
    return caught;
}

}  // namespace spokewright
