// What health has found out about a machine: a drift of its efficiency, a sensor that does not fit
// the others, or readings that break a law; with size, onset, cost, place and the figures that it
// rests on.
//
// Plain values. Every figure that can be uncertain carries its standard uncertainty (k = 1).
#pragma once

#include "thermo/measured.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/role.h"

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class FindingKind : std::uint8_t {
  efficiency_drift = 0,  // needs more power than it did under the same conditions
  sensor_suspect = 1,    // a sensor's readings no longer fit the others
  law_broken = 2,        // first or second law broken by the readings as they are
  count
};

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class FindingState : std::uint8_t {
  watch = 0,   // seen, not confirmed: shown, nobody is notified
  active = 1,  // confirmed
  over = 2,    // gone, or taken back: the residuals are as in the baseline again
  count
};

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class Component : std::uint8_t {
  compressor = 0,
  condenser = 1,
  expansion = 2,
  evaporator = 3,
  count
};
inline constexpr std::size_t component_count = static_cast<std::size_t>(Component::count);

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class Cause : std::uint8_t {
  condenser_fouled = 0,
  hot_flow_low = 1,
  evaporator_fouled = 2,
  cold_flow_low = 3,
  refrigerant_low = 4,
  overcharge_or_gas = 5,  // too much refrigerant, or a gas that does not condense
  compressor_worn = 6,
  sensor = 7,  // RankedCause::role says which
  count
};

[[nodiscard]] std::string_view name(FindingKind kind);  // "efficiency_drift", as in files and JSON
[[nodiscard]] std::string_view name(FindingState state);   // "watch"
[[nodiscard]] std::string_view name(Component component);  // "condenser"
[[nodiscard]] std::string_view name(Cause cause);          // "condenser_fouled"
[[nodiscard]] std::string_view text(Cause cause);          // "the condenser is fouled"
// What a person can do to tell this cause from the others: one sentence.
[[nodiscard]] std::string_view what_would_settle(Cause cause);

struct OnsetInterval {
  Instant best{};
  Instant earliest{};  // 95 % interval
  Instant latest{};
};

// One figure that the finding rests on: its mean over the days since the onset, and what the
// baseline expected under the same conditions; of a broken law, the figure of the last window that
// changed the finding, and the bound that the law sets. SI; u is of the difference.
struct Evidence {
  Quantity quantity{};
  double before_SI = 0.0;
  double after_SI = 0.0;
  double u_SI = 0.0;
};

struct RankedCause {
  Cause cause{};
  std::optional<Role> role;  // with Cause::sensor
  double probability = 0.0;  // 0..1 among the causes that were compared
  // What it takes to explain the figures: a share of the flow; K of approach; of the subcooling
  // the change of its share; the change of the efficiency; a sensor's bias in its SI unit, signed.
  Measured amount_SI;
};

// With law_broken size, cost, component, causes and baseline mean nothing.
struct Finding {
  std::string id;       // stable text, [A-Za-z0-9._-]: "chiller-1.efficiency_drift.20240503"
  std::string machine;  // MachineModel::id
  FindingKind kind{};
  FindingState state{};
  Measured size;  // extra power as a ratio to the expected power: 0.06 = 6 % more, like for like
  OnsetInterval onset;
  Instant first_seen{};
  std::optional<Instant> confirmed;
  std::optional<Instant> ended;
  Instant updated{};            // end of the last day that it rests on
  Measured extra_energy_J;      // since the onset; of the days and hours that could be compared
  double compared_share = 1.0;  // of the energy used since the onset, how much could be compared
  std::optional<Measured> extra_cost;    // in currency; none without a price
  std::string currency;                  // "EUR"
  std::optional<Measured> extra_co2_kg;  // none without a factor

  // Change of each component's lost work, like for like; W; none where it could not be computed.
  std::array<std::optional<Measured>, component_count> lost_change_W{};
  std::optional<Component> component;  // whose lost work grew most; none: cannot tell
  Measured component_share;            // of the extra power; means something with component only

  // Most likely first. The first is "the" cause only if cause_is_clear.
  std::vector<RankedCause> causes;
  bool cause_is_clear = false;        // at least three times as likely as the next
  std::vector<Role> suspect_sensors;  // most likely first, of a broken law in no order; empty: none
  std::vector<Evidence> evidence;
  std::string baseline_id;  // the baseline that it was compared with
};

template <class Archive>
void archive(Archive& a, OnsetInterval& o) {
  a(o.best, o.earliest, o.latest);
}
template <class Archive>
void archive(Archive& a, Evidence& e) {
  a(e.quantity, e.before_SI, e.after_SI, e.u_SI);
}
template <class Archive>
void archive(Archive& a, RankedCause& c) {
  a(c.cause, c.role, c.probability, c.amount_SI);
}
template <class Archive>
void archive(Archive& a, Finding& f) {
  a(f.id, f.machine, f.kind, f.state, f.size, f.onset, f.first_seen, f.confirmed, f.ended,
    f.updated, f.extra_energy_J, f.compared_share, f.extra_cost, f.currency, f.extra_co2_kg,
    f.lost_change_W, f.component, f.component_share, f.causes, f.cause_is_clear, f.suspect_sensors,
    f.evidence, f.baseline_id);
}

}  // namespace lostwork
