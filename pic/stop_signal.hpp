// SPDX-License-Identifier: MIT
// SIGINT and SIGTERM as a request that the hot run looks at between steps. A second signal ends the program at once.
#pragma once

namespace spokewright {

/// Catches both signals from now on.
void catch_stop_signals();

/// The signal that asked to stop, 0 if none.
int stop_signal();

}  // namespace spokewright
