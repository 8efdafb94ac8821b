// Questions to the equations of state, over states drawn at random from the range of a machine,
// beside what one exp and one pow cost on this computer.
#include "thermo/fluids/state.h"

#include <benchmark/benchmark.h>
#include <cmath>
#include <random>
#include <vector>

namespace lostwork {
namespace {

constexpr std::size_t count = 256;

std::vector<double> drawn(double low, double high) {
  std::mt19937_64 random{1};
  std::uniform_real_distribution<double> range{low, high};
  std::vector<double> out(count);
  for (double& value : out) {
    value = range(random);
  }
  return out;
}

void bare_exp(benchmark::State& run) {
  const std::vector<double> x = drawn(-2, 2);
  std::size_t i = 0;
  for (auto _ : run) {
    benchmark::DoNotOptimize(std::exp(x[i++ % count]));
  }
}
BENCHMARK(bare_exp);

void bare_pow(benchmark::State& run) {
  const std::vector<double> x = drawn(0.5, 2);
  std::size_t i = 0;
  for (auto _ : run) {
    benchmark::DoNotOptimize(std::pow(x[i++ % count], 1.7));
  }
}
BENCHMARK(bare_pow);

const Fluid& r134a() {
  return *fluid_named("R134a");
}

void saturation_by_temperature(benchmark::State& run) {
  const std::vector<double> T_K = drawn(253.15, 333.15);
  std::size_t i = 0;
  for (auto _ : run) {
    benchmark::DoNotOptimize(saturation_at_T(r134a(), T_K[i++ % count]));
  }
}
BENCHMARK(saturation_by_temperature);

void saturation_by_pressure(benchmark::State& run) {
  const std::vector<double> p_Pa = drawn(133e3, 1680e3);
  std::size_t i = 0;
  for (auto _ : run) {
    benchmark::DoNotOptimize(saturation_at_p(r134a(), p_Pa[i++ % count]));
  }
}
BENCHMARK(saturation_by_pressure);

std::vector<State> superheated() {
  const std::vector<double> p_Pa = drawn(133e3, 1680e3);
  const std::vector<double> superheat_K = drawn(1, 40);
  std::vector<State> out;
  for (std::size_t i = 0; i < count; ++i) {
    const double dew_T_K = saturation_at_p(r134a(), p_Pa[i])->vapour.T_K;
    out.push_back(
        *state(r134a(), GivenTp{.T_K = dew_T_K + superheat_K[count - 1 - i], .p_Pa = p_Pa[i]}));
  }
  return out;
}

template <class Question>
void ask(benchmark::State& run, const Question& question) {
  const std::vector<State> states = superheated();
  std::size_t i = 0;
  for (auto _ : run) {
    benchmark::DoNotOptimize(question(states[i++ % count]));
  }
}

void vapour_by_temperature_and_pressure(benchmark::State& run) {
  ask(run, [](const State& s) { return state(r134a(), GivenTp{.T_K = s.T_K, .p_Pa = s.p_Pa}); });
}
BENCHMARK(vapour_by_temperature_and_pressure);

void vapour_by_pressure_and_enthalpy(benchmark::State& run) {
  ask(run,
      [](const State& s) { return state(r134a(), GivenPh{.p_Pa = s.p_Pa, .h_Jkg = s.h_Jkg}); });
}
BENCHMARK(vapour_by_pressure_and_enthalpy);

void vapour_by_pressure_and_entropy(benchmark::State& run) {
  ask(run,
      [](const State& s) { return state(r134a(), GivenPs{.p_Pa = s.p_Pa, .s_JkgK = s.s_JkgK}); });
}
BENCHMARK(vapour_by_pressure_and_entropy);

}  // namespace
}  // namespace lostwork
