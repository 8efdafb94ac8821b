#include "thermo/health/laws.h"

#include "thermo/health/open_finding.h"

#include <algorithm>
#include <array>
#include <chrono>
#include <cmath>
#include <functional>
#include <iterator>
#include <utility>

namespace lostwork {
namespace {

// Persistence of methods.md 2.4 [E].
constexpr std::size_t least_windows = 12;
constexpr double lasting_share = 0.8;
constexpr Span memory = std::chrono::hours{24};
// A machine with few steady windows is judged by its last dozen, if they are no older [E].
constexpr Span longest_memory = std::chrono::days{7};

using enum Role;
using Roles = std::vector<Role>;

struct Law {
  Quantity shown;  // the figure that breaks it
  // What must not fall below 0: `above` less `below`, or `above` alone.
  Quantity above;
  std::optional<Quantity> below;
  bool both_sides;  // must be 0
  double factor;    // standard uncertainties
  Roles roles;
};

Law zero(Quantity q, Roles roles) {
  return {q, q, std::nullopt, true, 3.0, std::move(roles)};
}
Law not_negative(Quantity q, Roles roles) {
  return {q, q, std::nullopt, false, 2.0, std::move(roles)};
}
Law in_order(Quantity shown, Quantity above, Quantity below, Roles roles) {
  return {shown, above, below, false, 2.0, std::move(roles)};
}

const std::vector<Law>& laws() {
  using Q = Quantity;
  static const std::vector<Law> all{
      zero(Q::energy_residual, Roles{power, cold_in_temperature, cold_out_temperature, cold_flow,
                                     hot_in_temperature, hot_out_temperature, hot_flow}),
      in_order(Q::cold_out, Q::cold_in, Q::cold_out,
               Roles{cold_in_temperature, cold_out_temperature}),
      in_order(Q::hot_out, Q::hot_out, Q::hot_in, Roles{hot_in_temperature, hot_out_temperature}),
      in_order(Q::evaporating, Q::cold_in, Q::evaporating,
               Roles{suction_pressure, cold_in_temperature}),
      in_order(Q::condensing, Q::condensing, Q::hot_in,
               Roles{discharge_pressure, hot_in_temperature}),
      not_negative(Q::lost_compressor, Roles{suction_pressure, suction_temperature,
                                             discharge_pressure, discharge_temperature, power}),
      not_negative(Q::lost_condenser,
                   Roles{discharge_pressure, discharge_temperature, liquid_temperature,
                         hot_in_temperature, hot_out_temperature}),
      not_negative(Q::lost_expansion,
                   Roles{discharge_pressure, liquid_temperature, suction_pressure}),
      not_negative(Q::lost_evaporator, Roles{suction_pressure, suction_temperature,
                                             cold_in_temperature, cold_out_temperature}),
  };
  return all;
}

constexpr std::uint32_t bit(std::size_t law) {
  return 1U << law;
}

double variance(const WindowMean& mean) {
  const double random = mean.sd_SI / std::sqrt(std::max(mean.n_effective, 1.0));
  return mean.u_SI * mean.u_SI + random * random;
}

// What must not fall below 0, with u; of two quantities without the correlation that a matched pair
// has: the wider is the safer here.
std::optional<Measured> figure(const Law& law, const Window& window) {
  const auto& above = window[law.above];
  if (!above) {
    return std::nullopt;
  }
  if (!law.below) {
    return Measured{.value = above->mean_SI, .u = std::sqrt(variance(*above))};
  }
  const auto& below = window[*law.below];
  if (!below) {
    return std::nullopt;
  }
  return Measured{.value = above->mean_SI - below->mean_SI,
                  .u = std::sqrt(variance(*above) + variance(*below))};
}

Evidence evidence_of(const Law& law, const Window& window, const Measured& off) {
  const double found = window[law.shown]->mean_SI;
  // The quantity shown is `above` or `below`: at the bound the two are equal.
  const double bound = law.below == law.shown ? found + off.value : found - off.value;
  return {.quantity = law.shown, .before_SI = bound, .after_SI = found, .u_SI = off.u};
}

void forget(std::vector<LawWindow>& windows, Instant now) {
  const auto old = [&](const LawWindow& w) {
    return now - w.end > (windows.size() > least_windows ? memory : longest_memory);
  };
  while (!windows.empty() && old(windows.front())) {
    windows.erase(windows.begin());
  }
}

struct Broken {
  std::uint32_t lasting = 0;  // in four of five windows
  std::uint32_t still = 0;    // in more than one of five
};

Broken broken_in(const std::vector<LawWindow>& windows) {
  Broken out;
  for (std::size_t law = 0; law < laws().size(); ++law) {
    double tested = 0.0;
    double broken = 0.0;
    for (const LawWindow& window : windows) {
      tested += (window.tested & bit(law)) != 0U ? 1.0 : 0.0;
      broken += (window.broken & bit(law)) != 0U ? 1.0 : 0.0;
    }
    const bool enough = tested >= static_cast<double>(least_windows);
    out.lasting |= enough && broken >= lasting_share * tested ? bit(law) : 0U;
    out.still |= broken > (1.0 - lasting_share) * tested ? bit(law) : 0U;
  }
  return out;
}

// The sensors that all the broken laws have in common; all of theirs where they share none.
Roles suspects_of(std::uint32_t broken) {
  Roles common;
  Roles any;
  bool first = true;
  for (std::size_t law = 0; law < laws().size(); ++law) {
    if ((broken & bit(law)) == 0U) {
      continue;
    }
    const Roles& roles = laws()[law].roles;
    const auto belongs = [&](Role r) {
      return std::find(roles.begin(), roles.end(), r) != roles.end();
    };
    if (first) {
      common = roles;
    } else {
      common.erase(std::remove_if(common.begin(), common.end(), std::not_fn(belongs)),
                   common.end());
    }
    std::copy_if(roles.begin(), roles.end(), std::back_inserter(any),
                 [&](Role r) { return std::find(any.begin(), any.end(), r) == any.end(); });
    first = false;
  }
  return common.empty() ? any : common;
}

Roles measured_of(const MachineModel& machine, Roles roles) {
  const auto missing = [&](Role role) { return !machine.index_of(role); };
  roles.erase(std::remove_if(roles.begin(), roles.end(), missing), roles.end());
  return roles;
}

// Since the first broken window of the present run; the last whole one bounds it.
OnsetInterval onset_of(const std::vector<LawWindow>& windows, std::uint32_t broken) {
  const auto first = std::find_if(windows.begin(), windows.end(),
                                  [&](const LawWindow& w) { return (w.broken & broken) != 0U; });
  const Instant best = first->end;
  const Instant before = first == windows.begin() ? best : std::prev(first)->end;
  return {.best = best, .earliest = before, .latest = best};
}

}  // namespace

LawCheck check_laws(const Window& window) {
  LawCheck check;
  for (std::size_t i = 0; i < laws().size(); ++i) {
    const Law& law = laws()[i];
    const auto off = figure(law, window);
    if (!off) {
      continue;
    }
    check.tested |= bit(i);
    const double least = -law.factor * off->u;
    if (off->value < least || (law.both_sides && -off->value < least)) {
      check.broken |= bit(i);
      check.evidence.push_back(evidence_of(law, window, *off));
    }
  }
  return check;
}

std::optional<Finding> follow_laws(const HealthModel& model, HealthState& state, Instant end,
                                   const LawCheck& check) {
  state.law_windows.push_back({.end = end, .tested = check.tested, .broken = check.broken});
  forget(state.law_windows, end);
  const Broken broken = broken_in(state.law_windows);
  const auto already = open_of(state, FindingKind::law_broken);
  if (already && broken.still == 0U) {
    return closed(state, *already, end);
  }
  if (broken.lasting == 0U || open_of(state, FindingKind::sensor_suspect)) {
    return std::nullopt;
  }
  const Roles suspects = measured_of(model.machine, suspects_of(broken.lasting));
  if (already && state.findings[*already].suspect_sensors == suspects) {
    return std::nullopt;
  }
  Finding& finding = state.findings[opened(model, state, FindingKind::law_broken, end)];
  if (finding.state != FindingState::active) {
    finding.state = FindingState::active;
    finding.confirmed = end;
    finding.onset = onset_of(state.law_windows, broken.lasting);
  }
  finding.updated = end;
  finding.suspect_sensors = suspects;
  finding.evidence = check.evidence;
  return finding;
}

}  // namespace lostwork
