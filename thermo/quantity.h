// Every quantity that the program computes, named once: the store, the API, the CSV, the metrics
// and the pages all read this table.
#pragma once

#include "thermo/measured.h"
#include "thermo/result.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <string_view>

namespace lostwork {

// Stored in databases: the numbers are never changed, new ones go to the end.
// Signs and meanings: the table in quantity.cpp.
enum class Quantity : std::uint8_t {
  power = 0,
  cold_heat,
  hot_heat,
  cop,
  cop_reversible,
  second_law_efficiency,
  reversible_power,
  cold_mean,
  hot_mean,
  entropy_total,
  entropy_compressor,
  entropy_condenser,
  entropy_expansion,
  entropy_evaporator,
  entropy_lines,
  lost_compressor,
  lost_condenser,
  lost_expansion,
  lost_evaporator,
  lost_lines,
  lost_total,
  casing,
  unaccounted,
  evaporating,
  condensing,
  superheat,
  subcooling,
  lift,
  pressure_ratio,
  isentropic_efficiency,
  cold_approach,
  hot_approach,
  refrigerant_flow,
  power_expected,
  power_residual,
  energy_residual,
  cold_in,
  cold_out,
  cold_flow,
  hot_in,
  hot_out,
  hot_flow,
  discharge,
  casing_heat,
  reference,
  count
};

inline constexpr std::size_t quantity_count = static_cast<std::size_t>(Quantity::count);

// How a quantity adds up over time.
enum class QuantityKind : std::uint8_t {
  rate,   // a power: its integral is an energy
  level,  // a temperature, a ratio of states: its mean means something
  ratio   // a ratio of rates: never averaged, always made again from its parts
};

struct QuantityInfo {
  std::string_view name;    // with its unit, as in the CSV, the API and the store: "power_kW"
  std::string_view unit;    // for people: "kW"
  std::string_view symbol;  // for people: "W"
  QuantityKind kind;
  double per_SI;  // edge value = SI value * per_SI + offset
  double offset;
  std::string_view meaning;  // one sentence, with sign
};

[[nodiscard]] std::span<const QuantityInfo, quantity_count> quantities();
[[nodiscard]] const QuantityInfo& info(Quantity quantity);
[[nodiscard]] std::optional<Quantity> quantity_named(std::string_view name);

// For a ratio, the quantity in its denominator: mean ratio = sum(ratio * weight) / sum(weight),
// which is the ratio of the sums. None for all others.
[[nodiscard]] std::optional<Quantity> weight_of(Quantity ratio);

// From SI to the unit in the quantity's name; an uncertainty is scaled only.
[[nodiscard]] Measured at_the_edge(Quantity quantity, const Measured& value_SI);

// One value, or the reason why not, for every quantity. SI.
class QuantityValues {
 public:
  QuantityValues() {
    values_.fill(tl::unexpected{
        Reason{.code = ReasonCode::not_read, .blame = {}}
    });
  }
  Result<Measured>& operator[](Quantity q) { return values_.at(static_cast<std::size_t>(q)); }
  const Result<Measured>& operator[](Quantity q) const {
    return values_.at(static_cast<std::size_t>(q));
  }

 private:
  std::array<Result<Measured>, quantity_count> values_;
};

}  // namespace lostwork
