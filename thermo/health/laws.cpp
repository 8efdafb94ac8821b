#include "thermo/health/laws.h"

#include "thermo/health/day.h"
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
constexpr Span longest_memory = std::chrono::days{30};

using enum Role;
using Roles = std::vector<Role>;

struct Form {
  Quantity shown;  // the figure that breaks it
  // What must not fall below 0: `above` less `below`, or `above` alone.
  Quantity above;
  std::optional<Quantity> below;
  bool both_sides;  // must be 0
  double factor;    // standard uncertainties
};

constexpr Form zero(Quantity q) {
  return {.shown = q, .above = q, .below = std::nullopt, .both_sides = true, .factor = 3.0};
}
constexpr Form not_negative(Quantity q) {
  return {.shown = q, .above = q, .below = std::nullopt, .both_sides = false, .factor = 2.0};
}
constexpr Form in_order(Quantity shown, Quantity above, Quantity below) {
  return {.shown = shown, .above = above, .below = below, .both_sides = false, .factor = 2.0};
}

// In the order of Law.
constexpr std::array<Form, law_count> forms{
    zero(Quantity::energy_residual),
    in_order(Quantity::cold_out, Quantity::cold_in, Quantity::cold_out),
    in_order(Quantity::hot_out, Quantity::hot_out, Quantity::hot_in),
    in_order(Quantity::evaporating, Quantity::cold_in, Quantity::evaporating),
    in_order(Quantity::condensing, Quantity::condensing, Quantity::hot_in),
    not_negative(Quantity::lost_compressor),
    not_negative(Quantity::lost_condenser),
    not_negative(Quantity::lost_evaporator),
};

constexpr std::uint32_t bit(std::size_t law) {
  return 1U << law;
}

bool contains(const Roles& roles, Role role) {
  return std::find(roles.begin(), roles.end(), role) != roles.end();
}

void append(Roles& to, const Roles& from) {
  std::copy_if(from.begin(), from.end(), std::back_inserter(to),
               [&](Role role) { return !contains(to, role); });
}

const Roles cold_meter{cold_in_temperature, cold_out_temperature, cold_flow};
const Roles hot_meter{hot_in_temperature, hot_out_temperature, hot_flow};
const Roles circuit{suction_pressure, suction_temperature, discharge_pressure,
                    discharge_temperature, liquid_temperature};

bool measures(const MachineModel& machine, const Roles& roles) {
  return std::all_of(roles.begin(), roles.end(),
                     [&](Role role) { return machine.index_of(role).has_value(); });
}

// What the refrigerant's flow rests on: the heat meters there are, or else the power.
Roles flow_roles(const MachineModel& machine) {
  Roles roles;
  for (const Roles& meter : {cold_meter, hot_meter}) {
    append(roles, measures(machine, meter) ? meter : Roles{});
  }
  return roles.empty() ? Roles{power} : roles;
}

// Whether or not they are there.
Roles roles_of(Law law, const MachineModel& machine) {
  Roles roles;
  switch (law) {
    case Law::heats_close:
      append(roles, cold_meter);
      append(roles, hot_meter);
      // With the circuit measured, the casing's heat is the power less what the refrigerant took,
      // and the power falls out.
      append(roles, measures(machine, circuit) ? circuit : Roles{power});
      break;
    case Law::cold_stream_cools: roles = {cold_in_temperature, cold_out_temperature}; break;
    case Law::hot_stream_warms: roles = {hot_in_temperature, hot_out_temperature}; break;
    case Law::evaporates_below: roles = {suction_pressure, cold_in_temperature}; break;
    case Law::condenses_above: roles = {discharge_pressure, hot_in_temperature}; break;
    case Law::compressor_entropy:
      roles = {power};
      append(roles, circuit);
      append(roles, flow_roles(machine));
      break;
    case Law::condenser_entropy:
      roles = {discharge_pressure, discharge_temperature, liquid_temperature, hot_in_temperature,
               hot_out_temperature};
      break;
    case Law::evaporator_entropy:
      roles = {suction_pressure,    suction_temperature,  evaporator_out_temperature,
               cold_in_temperature, cold_out_temperature, liquid_temperature,
               discharge_pressure};
      break;
    case Law::count: break;
  }
  return roles;
}

bool accuracies_known(const MachineModel& machine, const Roles& roles) {
  return std::all_of(roles.begin(), roles.end(), [&](Role role) {
    const auto index = machine.index_of(role);
    return !index || machine.points[*index].accuracy_known;
  });
}

double variance(const WindowMean& mean) {
  const double random = mean.sd_SI / std::sqrt(std::max(mean.n_effective, 1.0));
  return mean.u_SI * mean.u_SI + random * random;
}

// What must not fall below 0, with u; of two quantities without the correlation that a matched pair
// has: the wider is the safer here.
std::optional<Measured> figure(const Form& form, const Window& window) {
  const auto& above = window[form.above];
  if (!above) {
    return std::nullopt;
  }
  if (!form.below) {
    return Measured{.value = above->mean_SI, .u = std::sqrt(variance(*above))};
  }
  const auto& below = window[*form.below];
  if (!below) {
    return std::nullopt;
  }
  return Measured{.value = above->mean_SI - below->mean_SI,
                  .u = std::sqrt(variance(*above) + variance(*below))};
}

Evidence evidence_of(const Form& form, const Window& window, const Measured& off) {
  const double found = window[form.shown]->mean_SI;
  // The quantity shown is `above` or `below`: at the bound the two are equal.
  const double bound = form.below == form.shown ? found + off.value : found - off.value;
  return {.quantity = form.shown, .before_SI = bound, .after_SI = found, .u_SI = off.u};
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
  std::uint32_t lasting = 0;  // in four of five windows, a dozen at least
  std::uint32_t whole = 0;    // in four of five windows, a dozen at least
};

Broken broken_in(const std::vector<LawWindow>& windows) {
  Broken out;
  for (std::size_t law = 0; law < law_count; ++law) {
    std::size_t tested = 0;
    std::size_t broken = 0;
    for (const LawWindow& window : windows) {
      tested += (window.tested & bit(law)) != 0U ? 1U : 0U;
      broken += (window.broken & bit(law)) != 0U ? 1U : 0U;
    }
    if (tested >= least_windows) {
      const double share = static_cast<double>(broken) / static_cast<double>(tested);
      out.lasting |= share >= lasting_share ? bit(law) : 0U;
      out.whole |= share <= 1.0 - lasting_share ? bit(law) : 0U;
    }
  }
  return out;
}

// The sensors that all the broken laws have in common; all of theirs where they share none.
Roles suspects_of(std::uint32_t broken, const MachineModel& machine) {
  std::vector<Roles> sensors;  // of each broken law
  for (std::size_t law = 0; law < law_count; ++law) {
    if ((broken & bit(law)) != 0U) {
      sensors.push_back(sensors_of(static_cast<Law>(law), machine));
    }
  }
  Roles any;
  for (const Roles& roles : sensors) {
    append(any, roles);
  }
  Roles common = any;
  std::erase_if(common, [&sensors](Role role) {
    return !std::all_of(sensors.begin(), sensors.end(),
                        [role](const Roles& roles) { return contains(roles, role); });
  });
  return common.empty() ? any : common;
}

// The first broken window after the last that was tested and whole of one of these laws, looked for
// from the newest back; a whole one among many broken does not stop the search.
OnsetInterval onset_of(const std::vector<LawWindow>& windows, std::uint32_t laws) {
  constexpr int whole_in_a_row = 3;
  auto first = windows.end();
  auto whole = windows.end();
  int row = 0;
  for (auto w = windows.end(); w != windows.begin() && row < whole_in_a_row;) {
    --w;
    const bool broken = (w->broken & laws) != 0U;
    first = broken ? w : first;
    row = broken || (w->tested & laws) == 0U ? 0 : row + 1;
    whole = row == 1 ? w : whole;
  }
  const bool bounded = row >= whole_in_a_row;
  return {.best = first->end,
          .earliest = bounded ? whole->end : windows.front().end - memory,
          .latest = first->end};
}

// A suspicion that people were told of, by the name of a sensor that is suspected here too.
bool told_already(const HealthState& state, const Roles& suspects) {
  const auto at = open_of(state, FindingKind::sensor_suspect);
  if (!at || state.findings[*at].state != FindingState::active) {
    return false;
  }
  const Roles& named = state.findings[*at].suspect_sensors;
  return !named.empty() && contains(suspects, named.front());
}

// What was seen under broken laws says nothing of the machine: charts and onsets begin again.
Finding end_law_finding(HealthState& state, std::size_t at, Instant end) {
  state.laws_said = 0;
  if (state.baseline && !open_of(state, FindingKind::efficiency_drift)) {
    state.charts = {};
    state.history_from = day_number(end);
  }
  return closed(state, at, end);
}

}  // namespace

std::vector<Role> sensors_of(Law law, const MachineModel& machine) {
  Roles roles = roles_of(law, machine);
  std::erase_if(roles, [&](Role role) { return !machine.index_of(role); });
  return roles;
}

LawCheck check_laws(const MachineModel& machine, const Window& window) {
  LawCheck check;
  for (std::size_t i = 0; i < law_count; ++i) {
    const Form& form = forms.at(i);
    const auto off = figure(form, window);
    if (!off || !std::isfinite(off->value) || !(off->u > 0.0) ||
        !accuracies_known(machine, sensors_of(static_cast<Law>(i), machine))) {
      continue;
    }
    check.tested |= bit(i);
    const double least = -form.factor * off->u;
    if (off->value < least || (form.both_sides && -off->value < least)) {
      check.broken |= bit(i);
      check.evidence.at(i) = evidence_of(form, window, *off);
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
  const std::uint32_t said = state.laws_said & ~broken.whole;
  if (already && said == 0U) {
    return end_law_finding(state, *already, end);
  }
  const std::uint32_t now = said | broken.lasting;
  if ((broken.lasting & check.broken) == 0U || (already && now == state.laws_said)) {
    return std::nullopt;
  }
  const Roles suspects = suspects_of(now, model.machine);
  if (!already && told_already(state, suspects)) {
    return std::nullopt;
  }
  state.laws_said = now;
  Finding& finding = state.findings[opened(model, state, FindingKind::law_broken, end)];
  if (!already) {
    finding.state = FindingState::active;
    finding.confirmed = end;
    finding.onset = onset_of(state.law_windows, now);
  }
  finding.updated = end;
  finding.suspect_sensors = suspects;
  finding.evidence.clear();
  for (std::size_t law = 0; law < law_count; ++law) {
    if (const auto& evidence = check.evidence.at(law); evidence && (now & bit(law)) != 0U) {
      finding.evidence.push_back(*evidence);
    }
  }
  return finding;
}

bool any_broken(const HealthState& state) {
  return std::any_of(state.law_windows.begin(), state.law_windows.end(),
                     [](const LawWindow& w) { return w.broken != 0U; });
}

}  // namespace lostwork
