// SPDX-License-Identifier: MIT
// What the user typed, and the verbs.
#pragma once

namespace spokewright {

/// Runs one command and returns its exit status: 0 done, 2 bad command line or deck, 3 the numbers failed, 4 a file
/// cannot be read or written, 130 / 143 stopped by a signal with the state saved. Errors go to standard error.
int run_command(int argc, const char* const* argv);

}  // namespace spokewright
