// SPDX-License-Identifier: MIT
// Spokewright as a user starts it: a process of its own, with its exit status and what it wrote, without a shell.
#pragma once

#include <spawn.h>
#include <stdio.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include <algorithm>
#include <chrono>
#include <csignal>
#include <filesystem>
#include <ostream>
#include <stdexcept>
#include <string>
#include <string_view>
#include <thread>
#include <utility>
#include <vector>

#include "tests/scratch_folder.hpp"

extern char** environ;

namespace spokewright {

using Arguments = std::vector<std::string>;

struct Outcome {
    int status = 0;  // as a shell shows it: 128 + signal when one ended the process
    std::string out;
    std::string err;
};

/// A started spokewright. Output goes to unnamed files: it can be read while the process runs, and no pipe fills up.
class Command {
public:
    explicit Command(const Arguments& arguments) : out_(tmpfile()), err_(tmpfile()) {
        std::vector<char*> argv{const_cast<char*>(SPOKEWRIGHT_BINARY)};
        for (const std::string& argument : arguments) argv.push_back(const_cast<char*>(argument.c_str()));
        argv.push_back(nullptr);
        posix_spawn_file_actions_t files;
        posix_spawn_file_actions_init(&files);
        posix_spawn_file_actions_addopen(&files, STDIN_FILENO, "/dev/null", 0, 0);
        posix_spawn_file_actions_adddup2(&files, fileno(out_), STDOUT_FILENO);
        posix_spawn_file_actions_adddup2(&files, fileno(err_), STDERR_FILENO);
        const int error = posix_spawn(&process_, SPOKEWRIGHT_BINARY, &files, nullptr, argv.data(), environ);
        posix_spawn_file_actions_destroy(&files);
        if (error != 0) throw std::runtime_error("cannot start " SPOKEWRIGHT_BINARY);
    }
    ~Command() {
        if (running_) {  // a failed test must not leave it behind
            signal(SIGKILL);
            wait();
        }
        fclose(out_);
        fclose(err_);
    }
    Command(const Command&) = delete;
    Command& operator=(const Command&) = delete;

    void signal(int number) const { kill(process_, number); }

    /// Returns when standard error holds `text`; throws when the process ends without it.
    void wait_for_error_text(std::string_view text) {
        while (read(err_).find(text) == std::string::npos) {
            siginfo_t ended{};
            waitid(P_PID, static_cast<id_t>(process_), &ended, WEXITED | WNOHANG | WNOWAIT);
            if (ended.si_pid != 0) throw std::runtime_error("ended early: " + read(err_));
            std::this_thread::sleep_for(std::chrono::milliseconds(1));
        }
    }

    Outcome wait() {
        int status = 0;
        waitpid(process_, &status, 0);
        running_ = false;
        return {WIFEXITED(status) ? WEXITSTATUS(status) : 128 + WTERMSIG(status), read(out_), read(err_)};
    }

private:
    static std::string read(FILE* file) {
        struct stat facts {};
        fstat(fileno(file), &facts);
        std::string text(static_cast<std::size_t>(facts.st_size), '\0');
        const ssize_t count = pread(fileno(file), text.data(), text.size(), 0);  // leaves the writer's place alone
        text.resize(count > 0 ? static_cast<std::size_t>(count) : 0);
        return text;
    }

    FILE* out_;
    FILE* err_;
    pid_t process_ = 0;
    bool running_ = true;
};

inline Outcome spokewright(const Arguments& arguments) {
    return Command(arguments).wait();
}

/// `spokewright run` of a deck into a folder.
inline Arguments run_of(const std::string& deck, const std::string& folder, const Arguments& more = {}) {
    Arguments arguments{"run", deck, "--out", folder};
    arguments.insert(arguments.end(), more.begin(), more.end());
    return arguments;
}

/// `text` with every `part` left out: messages without the name of the scratch folder.
inline std::string without(std::string text, const std::string& part) {
    for (std::size_t at = text.find(part); at != std::string::npos; at = text.find(part, at)) {
        text.erase(at, part.size());
    }
    return text;
}

/// Names in a folder, sorted; none when it is missing.
inline std::vector<std::string> names_in(const std::string& folder) {
    std::vector<std::string> names;
    std::error_code missing;
    for (const auto& entry : std::filesystem::directory_iterator(folder, missing)) {
        names.push_back(entry.path().filename().string());
    }
    std::sort(names.begin(), names.end());
    return names;
}

}  // namespace spokewright
