// SPDX-License-Identifier: MIT
// Push and scatter of one cloud on 64 x 256 cells: the plain steps of tests/oracle and the fast one on every
// instruction set. Names are part/variant/electrons[/threads].
#include <algorithm>
#include <string>

#include "pic/push.hpp"
#include "pic/scatter.hpp"
#include "tests/bench/counters.hpp"
#include "tests/drifting_cloud.hpp"

namespace spokewright {
namespace {

constexpr int kRadial = 64;
constexpr int kAzimuthal = 256;

void textbook(benchmark::State& state, std::size_t electrons) {
    const DriftingCloud cloud(kRadial, kAzimuthal, electrons);
    const oracle::ReferenceStep step(cloud.units.grid, cloud.units.dt);
    oracle::Electrons all = cloud.reference_electrons();
    std::vector<double> nodes(cloud.units.grid.nodes());
    const ElectronClock clock;
    for (auto _ : state) {
        benchmark::DoNotOptimize(step.push(all, cloud.potential, 1, cloud.magnetic));
        std::fill(nodes.begin(), nodes.end(), 0.0);
        step.deposit(all, nodes);
        benchmark::ClobberMemory();
    }
    clock.report(state, static_cast<double>(electrons));
}

void tuned_scalar(benchmark::State& state, std::size_t electrons) {
    const DriftingCloud cloud(kRadial, kAzimuthal, electrons);
    oracle::TunedStep step(cloud.units.grid, cloud.units.dt);
    step.set_field(cloud.potential, 1, cloud.magnetic);
    oracle::TunedElectrons all = cloud.tuned_electrons();
    std::vector<double> nodes(cloud.units.grid.nodes());
    const ElectronClock clock;
    for (auto _ : state) {
        benchmark::DoNotOptimize(step.push(all));
        std::fill(nodes.begin(), nodes.end(), 0.0);
        step.deposit(all, nodes);
        benchmark::ClobberMemory();
    }
    clock.report(state, static_cast<double>(electrons));
}

enum class Part { both, push, scatter };

void fast(benchmark::State& state, std::size_t electrons, InstructionSet set, int threads, Part part) {
    DriftingCloud cloud(kRadial, kAzimuthal, electrons);
    Push push(cloud.units, threads, set);
    Scatter scatter(cloud.units, -1e-15, threads, set);
    const ElectronClock clock;
    for (auto _ : state) {
        if (part != Part::scatter) {
            push.advance(cloud.store, cloud.force);
            cloud.store.remove(push.hits());
        }
        if (part != Part::push) {
            scatter.deposit(cloud.store);
        }
        benchmark::ClobberMemory();
    }
    clock.report(state, static_cast<double>(electrons));
    state.counters["bytes"] = sizeof(Electron);
}

template <class Work, class... Arguments>
void add(const std::string& name, Work work, Arguments... arguments) {
    benchmark::RegisterBenchmark(name.c_str(), [=](benchmark::State& state) { work(state, arguments...); })
        ->Unit(benchmark::kMicrosecond)
        ->UseRealTime();
}

const bool kRegistered = [] {
    constexpr std::size_t cloud = 200'000;
    add("electrons/textbook double/200000/1", textbook, cloud);
    add("electrons/tuned scalar double/200000/1", tuned_scalar, cloud);
    for (const InstructionSet set : instruction_sets()) {
        const std::string name(name_of(set));
        add("electrons/" + name + "/200000/1", fast, cloud, set, 1, Part::both);
        add("push alone/" + name + "/200000/1", fast, cloud, set, 1, Part::push);
        add("scatter alone/" + name + "/200000/1", fast, cloud, set, 1, Part::scatter);
    }
    const InstructionSet best = fastest_instruction_set();
    for (const std::size_t electrons : {20'000U, 50'000U, 200'000U, 1'000'000U}) {
        for (const int threads : {1, 2}) {
            add("electrons, fastest/" + std::string(name_of(best)) + "/" + std::to_string(electrons) + "/" +
                    std::to_string(threads),
                fast, electrons, best, threads, Part::both);
        }
    }
    return true;
}();

}  // namespace
}  // namespace spokewright
