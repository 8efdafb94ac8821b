// What thermodynamics demands of any equation of state, over every fluid and a grid of states.
//
// Differences are central, with steps of 1e-4 of T and 1e-3 of p: their own error is about the
// square of the step, hence the tolerances of 1e-6 and 1e-5.
#include "tests/thermo/fluids/grid.h"
#include "thermo/fluids/fluid.h"
#include "thermo/fluids/helmholtz.h"

#include <array>
#include <cmath>
#include <utility>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

State at(const Fluid& fluid, double T_K, double p_Pa) {
  return state(fluid, GivenTp{T_K, p_Pa}).value();
}

class Everywhere : public testing::TestWithParam<SinglePhasePlace> {
 protected:
  [[nodiscard]] const Fluid& fluid() const { return *fluid_named(GetParam().fluid); }
  [[nodiscard]] State here() const {
    const GivenTp place = given(GetParam());
    return at(fluid(), place.T_K, place.p_Pa);
  }
  [[nodiscard]] State hotter(double share) const {
    return at(fluid(), here().T_K * (1.0 + share), here().p_Pa);
  }
  [[nodiscard]] State tighter(double share) const {
    return at(fluid(), here().T_K, here().p_Pa * (1.0 + share));
  }
};

TEST_P(Everywhere, HeatCapacityIsTheSlopeOfTheEnthalpy) {
  const double slope = (hotter(1e-4).h_Jkg - hotter(-1e-4).h_Jkg) / (2e-4 * here().T_K);
  EXPECT_NEAR(slope, here().single->cp_JkgK, 1e-5 * slope);
}

TEST_P(Everywhere, ExpansionIsTheSlopeOfTheVolume) {
  const double slope =
      here().rho_kgm3 * (1.0 / hotter(1e-4).rho_kgm3 - 1.0 / hotter(-1e-4).rho_kgm3) / 2e-4;
  EXPECT_NEAR(slope, here().single->expansion_T, 1e-5 * std::abs(slope));
}

TEST_P(Everywhere, EnthalpyOverPressureFollowsFromTheExpansion) {
  const double slope = (tighter(1e-3).h_Jkg - tighter(-1e-3).h_Jkg) / (2e-3 * here().p_Pa);
  const double expected = (1.0 - here().single->expansion_T) / here().rho_kgm3;
  EXPECT_NEAR(slope, expected, 1e-4 * std::abs(expected) + 1e-6 / here().rho_kgm3);
}

TEST_P(Everywhere, SoundIsAnIsentropicChangeOfPressure) {
  const double step_Pa = 1e-3 * here().p_Pa;
  const State denser = state(fluid(), GivenPs{here().p_Pa + step_Pa, here().s_JkgK}).value();
  const State thinner = state(fluid(), GivenPs{here().p_Pa - step_Pa, here().s_JkgK}).value();
  const double squared = 2.0 * step_Pa / (denser.rho_kgm3 - thinner.rho_kgm3);
  EXPECT_NEAR(std::sqrt(squared), here().single->sound_speed_w, 1e-5 * std::sqrt(squared));
}

TEST_P(Everywhere, InternalEnergyChangesByHeatLessWork) {
  // du = T ds - p dv on a step of both T and rho, with u = h - p v: midpoint rule.
  const State middle = here();
  const auto properties = [&](double share) {
    const Isotherm isotherm{fluid(), middle.T_K * (1.0 + share)};
    const double rho = middle.rho_kgm3 * (1.0 + 2.0 * share);
    const Properties all = isotherm.properties(rho);
    return std::array{all.h_Jkg - all.p_Pa / rho, all.s_JkgK, 1.0 / rho};
  };
  const auto [u_up, s_up, v_up] = properties(1e-4);
  const auto [u_down, s_down, v_down] = properties(-1e-4);
  const double heat = middle.T_K * (s_up - s_down);
  const double work = middle.p_Pa * (v_up - v_down);
  EXPECT_NEAR(u_up - u_down, heat - work, 1e-6 * (std::abs(heat) + std::abs(work)));
}

// Five-point Gauss-Legendre on [0, 1] (Abramowitz and Stegun 1964, table 25.4).
template <class Integrand>
double integral(Integrand&& integrand) {
  constexpr std::array<std::pair<double, double>, 3> points{
      {{0.0, 0.5688888888888889},
       {0.5384693101056831, 0.4786286704993665},
       {0.9061798459386640, 0.2369268850561891}}
  };
  constexpr int parts = 8;
  double sum = 0.0;
  for (int part = 0; part < parts; ++part) {
    for (const auto& [x, weight] : points) {
      const double scale = x == 0.0 ? 0.25 : 0.5;  // the middle point counts once
      sum += scale * weight * integrand((part + 0.5 * (1.0 + x)) / parts);
      sum += scale * weight * integrand((part + 0.5 * (1.0 - x)) / parts);
    }
  }
  return sum / parts;
}

struct Path {
  double from_T_K, to_T_K, from_p_Pa, to_p_Pa;
};
double entropy_by_isobar(const Fluid& fluid, const Path& path, double p_Pa) {
  return integral([&](double share) {
    const double T_K = path.from_T_K + share * (path.to_T_K - path.from_T_K);
    return at(fluid, T_K, p_Pa).single->cp_JkgK / T_K * (path.to_T_K - path.from_T_K);
  });
}
double entropy_by_isotherm(const Fluid& fluid, const Path& path, double T_K) {
  return integral([&](double share) {
    const double p_Pa = path.from_p_Pa + share * (path.to_p_Pa - path.from_p_Pa);
    const State here = at(fluid, T_K, p_Pa);
    return -here.single->expansion_T / (here.rho_kgm3 * T_K) * (path.to_p_Pa - path.from_p_Pa);
  });
}

TEST_P(Everywhere, EntropyChangesAlikeOnTwoPaths) {
  const State begin = here();
  const Path path{begin.T_K, 1.02 * begin.T_K, begin.p_Pa, 0.97 * begin.p_Pa};
  const Path rising{begin.T_K, 0.98 * begin.T_K, begin.p_Pa, 1.03 * begin.p_Pa};
  // Away from the saturation line: down in pressure and hotter for vapour, the opposite for liquid.
  const Path& taken = begin.phase == Phase::liquid ? rising : path;
  const double change = at(fluid(), taken.to_T_K, taken.to_p_Pa).s_JkgK - begin.s_JkgK;
  const double heating_first = entropy_by_isobar(fluid(), taken, taken.from_p_Pa) +
                               entropy_by_isotherm(fluid(), taken, taken.to_T_K);
  const double heating_last = entropy_by_isotherm(fluid(), taken, taken.from_T_K) +
                              entropy_by_isobar(fluid(), taken, taken.to_p_Pa);
  EXPECT_NEAR(heating_first, change, 1e-7 * std::abs(change));
  EXPECT_NEAR(heating_last, change, 1e-7 * std::abs(change));
}

TEST_P(Everywhere, EnthalpyAndEntropyLeadBackToTheState) {
  // goals.md E1: round trips to 1e-8.
  const State begin = here();
  const State by_h = state(fluid(), GivenPh{begin.p_Pa, begin.h_Jkg}).value();
  const State by_s = state(fluid(), GivenPs{begin.p_Pa, begin.s_JkgK}).value();
  EXPECT_NEAR(by_h.T_K, begin.T_K, 1e-8 * begin.T_K);
  EXPECT_NEAR(by_s.T_K, begin.T_K, 1e-8 * begin.T_K);
  EXPECT_EQ(by_h.phase, begin.phase);
  EXPECT_EQ(by_s.phase, begin.phase);
}

INSTANTIATE_TEST_SUITE_P(AllFluids, Everywhere, testing::ValuesIn(single_phase_grid()),
                         [](const auto& tested) { return name_of(tested.param); });

}  // namespace
}  // namespace lostwork
