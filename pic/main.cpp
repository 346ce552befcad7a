// SPDX-License-Identifier: MIT
#include "pic/command_line.hpp"

int main(int argc, char** argv) {
    return spokewright::run_command(argc, argv);
}
