// SPDX-License-Identifier: MIT
#include "pic/command_line.hpp"

#include <fmt/format.h>
#include <fmt/ostream.h>
#include <unistd.h>

#include <algorithm>
#include <array>
#include <boost/program_options.hpp>
#include <csignal>
#include <iostream>
#include <new>
#include <string>
#include <vector>

#include "diagnostics/chart_sweep.hpp"
#include "diagnostics/chart_text.hpp"
#include "diagnostics/summary_text.hpp"
#include "inputs/deck_keys.hpp"
#include "inputs/deck_reader.hpp"
#include "inputs/errors.hpp"
#include "pic/hot_run.hpp"
#include "pic/stop_signal.hpp"

namespace spokewright {
namespace {

namespace options = boost::program_options;
using Arguments = std::vector<std::string>;

struct Verb {
    const char* name;
    const char* usage;
    const char* does;
    int (*run)(const Verb&, const Arguments&);
};

/// Parses `arguments` by `named` and `positional`; prints the help and returns false when it was asked for.
bool parse(const Verb& verb, const Arguments& arguments, const options::options_description& named,
           const std::string& positional, options::variables_map& values) {
    options::options_description all;
    all.add(named).add_options()("help", "this text");
    options::positional_options_description places;
    if (!positional.empty()) {
        all.add_options()(positional.c_str(), options::value<std::string>(), "");
        places.add(positional.c_str(), 1);
    }
    const int style = options::command_line_style::default_style & ~options::command_line_style::allow_guessing;
    try {
        options::store(options::command_line_parser(arguments).options(all).positional(places).style(style).run(),
                       values);
        options::notify(values);
    } catch (const options::error& error) {
        throw InputError(fmt::format("{}: {}; usage: spokewright {}", verb.name, error.what(), verb.usage));
    }
    if (values.count("help") > 0) {
        std::cout << "usage: spokewright " << verb.usage << "\n" << verb.does << "\n\n" << named;
        return false;
    }
    if (!positional.empty() && (values.count(positional) == 0 || values[positional].as<std::string>().empty())) {
        throw InputError(fmt::format("{}: {} is missing; usage: spokewright {}", verb.name, positional, verb.usage));
    }
    return true;
}

int run_verb(const Verb& verb, const Arguments& arguments) {
    options::options_description named("options");
    named.add_options()("out", options::value<std::string>(), "folder for run.h5, summary.json and state.h5")(
        "set", options::value<Arguments>()->composing(), "section.key=value, wins over the deck; may be repeated")(
        "threads", options::value<int>(), "threads of the run; its result does not depend on them")(
        "resume", options::bool_switch(), "go on from the state in the folder")("replace", options::bool_switch(),
                                                                                "replace a result in the folder")(
        "quiet", options::bool_switch(), "no progress, no summary; errors and warnings only");
    options::variables_map values;
    if (!parse(verb, arguments, named, "DECK", values)) {
        return 0;
    }
    if (values.count("out") == 0 || values["out"].as<std::string>().empty()) {
        throw InputError(fmt::format("run: --out is missing; usage: spokewright {}", verb.usage));
    }
    const bool quiet = values["quiet"].as<bool>();
    const Deck deck = read_deck(values["DECK"].as<std::string>(),
                                values.count("set") > 0 ? values["set"].as<Arguments>() : Arguments{});
    RunOptions run;
    run.folder = values["out"].as<std::string>();
    run.threads = values.count("threads") > 0 ? values["threads"].as<int>() : default_threads(deck);
    run.resume = values["resume"].as<bool>();
    run.replace = values["replace"].as<bool>();
    if (run.threads < 1 || run.threads > 256) {
        throw InputError(fmt::format("run: --threads {}: out of range; 1 to 256", run.threads));
    }
    if (run.resume && run.replace) {
        throw InputError("run: --resume and --replace exclude each other; give one of them");
    }
    const std::vector<std::string> warnings = check_deck(deck);
    for (const std::string& warning : warnings) {
        fmt::print(std::cerr, "warning: {}\n", warning);
    }
    catch_stop_signals();
    // A closed pipe or a limit on the size of files shows where the write fails; neither may kill the run before that.
    std::signal(SIGPIPE, SIG_IGN);
    std::signal(SIGXFSZ, SIG_IGN);
    RunOutcome outcome;
    {
        Progress progress(std::cerr, isatty(STDERR_FILENO) != 0, quiet);
        outcome = hot_run(deck, run, progress, warnings);
    }
    if (!quiet) {
        for (const std::string& line : summary_lines(outcome.summary)) {
            std::cout << line << '\n';
        }
    }
    return outcome.signal == 0 ? 0 : 128 + outcome.signal;
}

int chart_verb(const Verb& verb, const Arguments& arguments) {
    options::options_description named("options");
    named.add_options()("set", options::value<Arguments>()->composing(),
                        "section.key=value, wins over the deck; may be repeated")("json", options::bool_switch(),
                                                                                  "the same numbers as JSON")(
        "sweep", options::value<std::string>(),
        "section.key=from:to:steps, the main lines at from, to and steps - 1 values between, as CSV");
    options::variables_map values;
    if (!parse(verb, arguments, named, "DECK", values)) {
        return 0;
    }
    const auto path = values["DECK"].as<std::string>();
    const Arguments overrides = values.count("set") > 0 ? values["set"].as<Arguments>() : Arguments{};
    const bool json = values["json"].as<bool>();
    if (values.count("sweep") > 0) {
        if (json) {
            throw InputError("chart: --json and --sweep exclude each other; give one of them");
        }
        std::cout << chart_csv(path, overrides, read_chart_sweep(values["sweep"].as<std::string>()));
        return 0;
    }
    const Chart chart = operating_chart(read_deck(path, overrides));
    if (json) {
        std::cout << chart_json_text(chart);
        return 0;
    }
    for (const std::string& line : chart_lines(chart)) {
        std::cout << line << '\n';
    }
    return 0;
}

int keys_verb(const Verb& verb, const Arguments& arguments) {
    options::options_description named("options");
    named.add_options()("markdown", options::bool_switch(), "as a Markdown table");
    options::variables_map values;
    if (parse(verb, arguments, named, "", values)) {
        std::cout << (values["markdown"].as<bool>() ? key_table_markdown() : key_table_text());
    }
    return 0;
}

constexpr std::array<Verb, 3> kVerbs{{
    {"run", "run DECK --out DIR [--set section.key=value ...] [--threads n] [--resume | --replace] [--quiet]",
     "One hot run of the tube in DECK.", run_verb},
    {"chart", "chart DECK [--set section.key=value ...] [--json | --sweep section.key=from:to:steps]",
     "What closed forms say of the tube in DECK: cutoff, thresholds, hub, efficiency, currents.", chart_verb},
    {"keys", "keys [--markdown]", "Every deck key: unit, range, default and meaning.", keys_verb},
}};

std::string usage() {
    std::string text = "usage:\n";
    for (const Verb& verb : kVerbs) {
        text += fmt::format("  spokewright {}\n      {}\n", verb.usage, verb.does);
    }
    return text + "  spokewright --version\nspokewright VERB --help says more.\n";
}

int dispatch(const Arguments& arguments) {
    const std::string first = arguments.empty() ? "" : arguments.front();
    if (first == "--help" || first == "-h") {
        std::cout << usage();
        return 0;
    }
    if (first == "--version") {
        std::cout << "spokewright " << SPOKEWRIGHT_VERSION << '\n';
        return 0;
    }
    const auto verb = std::find_if(kVerbs.begin(), kVerbs.end(), [&](const Verb& v) { return first == v.name; });
    if (verb == kVerbs.end()) {
        std::string names;
        for (const Verb& known : kVerbs) {
            names += fmt::format("{}{}", names.empty() ? "" : ", ", known.name);
        }
        throw InputError(first.empty() ? "no verb; one of " + names + ", or --help"
                                       : fmt::format("'{}' is no verb; one of {}, or --help", first, names));
    }
    return verb->run(*verb, Arguments(arguments.begin() + 1, arguments.end()));
}

}  // namespace

int run_command(int argc, const char* const* argv) {
    const auto fail = [](const std::exception& error, int status) {
        std::cerr << error.what() << '\n';
        return status;
    };
    try {
        const int status = dispatch(Arguments(argv + 1, argv + argc));
        std::cout.flush();
        if (!std::cout) {
            throw FileError("standard output: cannot be written");
        }
        return status;
    } catch (const InputError& error) {
        return fail(error, 2);
    } catch (const NumericsError& error) {
        return fail(error, 3);
    } catch (const FileError& error) {
        return fail(error, 4);
    } catch (const std::bad_alloc&) {
        std::cerr << "not enough memory; lower electrons.target_count or the size of the grid\n";
        return 3;
    } catch (const std::exception& error) {
        std::cerr << "a fault of the program, please report it: " << error.what() << '\n';
        return 3;
    }
}

}  // namespace spokewright
