#include "thermo/quantity.h"

namespace lostwork {
namespace {

using enum QuantityKind;

constexpr double kilo = 1e-3;
constexpr double kelvin_offset = -273.15;

constexpr std::array<QuantityInfo, quantity_count> table{
    {
     {"power_kW", "kW", "W", rate, kilo, 0, "electrical power into the machine"},
     {"cold_heat_kW", "kW", "Q_L", rate, kilo, 0,
     "heat from the cold stream into the machine, by its meter"},
     {"hot_heat_kW", "kW", "Q_H", rate, kilo, 0,
     "heat from the machine into the hot stream, by its meter"},
     {"cop", "1", "COP", ratio, 1, 0, "useful heat over power"},
     {"cop_reversible", "1", "COP_rev", ratio, 1, 0,
     "COP of a reversible machine between the same two streams"},
     {"second_law_efficiency", "1", "eta_II", ratio, 1, 0, "reversible power over power"},
     {"reversible_power_kW", "kW", "W_rev", rate, kilo, 0,
     "least power for the same useful heat between the same two streams"},
     {"cold_mean_degC", "degC", "T_L", level, 1, kelvin_offset,
     "entropic mean temperature of the cold stream"},
     {"hot_mean_degC", "degC", "T_H", level, 1, kelvin_offset,
     "entropic mean temperature of the hot stream"},
     {"entropy_total_W_K", "W/K", "S", rate, 1, 0,
     "entropy generated in all components together"},
     {"entropy_compressor_W_K", "W/K", "S_comp", rate, 1, 0,
     "entropy generated in the compressor with its drive"},
     {"entropy_condenser_W_K", "W/K", "S_cond", rate, 1, 0,
     "entropy generated in the condenser"},
     {"entropy_expansion_W_K", "W/K", "S_exp", rate, 1, 0,
     "entropy generated in the expansion valve"},
     {"entropy_evaporator_W_K", "W/K", "S_evap", rate, 1, 0,
     "entropy generated in the evaporator"},
     {"entropy_lines_W_K", "W/K", "S_lines", rate, 1, 0,
     "entropy generated in the refrigerant lines"},
     {"lost_compressor_kW", "kW", "L_comp", rate, kilo, 0,
     "work that the compressor with its drive destroys"},
     {"lost_condenser_kW", "kW", "L_cond", rate, kilo, 0, "work that the condenser destroys"},
     {"lost_expansion_kW", "kW", "L_exp", rate, kilo, 0,
     "work that the expansion valve destroys"},
     {"lost_evaporator_kW", "kW", "L_evap", rate, kilo, 0, "work that the evaporator destroys"},
     {"lost_lines_kW", "kW", "L_lines", rate, kilo, 0,
     "work that the refrigerant lines destroy"},
     {"lost_total_kW", "kW", "L", rate, kilo, 0, "work that all components destroy together"},
     {"casing_kW", "kW", "X_a", rate, kilo, 0, "work value of the heat that leaves the casing"},
     {"unaccounted_kW", "kW", "r", rate, kilo, 0,
     "what product meter and refrigerant side disagree about, in work"},
     {"evaporating_degC", "degC", "T_e", level, 1, kelvin_offset,
     "dew temperature at the suction pressure"},
     {"condensing_degC", "degC", "T_c", level, 1, kelvin_offset,
     "dew temperature at the discharge pressure"},
     {"superheat_K", "K", "SH", level, 1, 0,
     "suction temperature above the evaporating temperature"},
     {"subcooling_K", "K", "SC", level, 1, 0, "liquid temperature below the bubble temperature"},
     {"lift_K", "K", "dT", level, 1, 0, "hot mean less cold mean"},
     {"pressure_ratio", "1", "p_c/p_e", level, 1, 0, "discharge pressure over suction pressure"},
     {"isentropic_efficiency", "1", "eta_is", level, 1, 0,
     "isentropic over actual rise of enthalpy in the compressor"},
     {"cold_approach_K", "K", "dT_e", level, 1, 0,
     "cold stream leaving less evaporating temperature"},
     {"hot_approach_K", "K", "dT_c", level, 1, 0,
     "condensing temperature less hot stream leaving"},
     {"refrigerant_flow_kg_s", "kg/s", "m", rate, 1, 0, "refrigerant mass flow"},
     {"power_expected_kW", "kW", "W_exp", rate, kilo, 0,
     "power that the machine needed under the same conditions when it was well"},
     {"power_residual_percent", "%", "r_W", ratio, 100, 0,
     "power above what is expected, of what is expected"},
     {"energy_residual_kW", "kW", "r_E", rate, kilo, 0,
     "power and cold heat less hot heat and casing heat, by the meters"},
     {"cold_in_degC", "degC", "T_L,in", level, 1, kelvin_offset, "cold stream entering"},
     {"cold_out_degC", "degC", "T_L,out", level, 1, kelvin_offset, "cold stream leaving"},
     {"cold_flow_kg_s", "kg/s", "m_L", rate, 1, 0, "mass flow of the cold stream"},
     {"hot_in_degC", "degC", "T_H,in", level, 1, kelvin_offset, "hot stream entering"},
     {"hot_out_degC", "degC", "T_H,out", level, 1, kelvin_offset, "hot stream leaving"},
     {"hot_flow_kg_s", "kg/s", "m_H", rate, 1, 0, "mass flow of the hot stream"},
     {"discharge_degC", "degC", "T_2", level, 1, kelvin_offset,
     "refrigerant leaving the compressor"},
     {"casing_heat_kW", "kW", "Q_a", rate, kilo, 0, "heat that leaves the casing"},
     {"reference_degC", "degC", "T_0", level, 1, kelvin_offset,
     "temperature at which entropy is turned into lost work"},
     }
};

}  // namespace

std::span<const QuantityInfo, quantity_count> quantities() {
  return table;
}

const QuantityInfo& info(Quantity quantity) {
  return table.at(static_cast<std::size_t>(quantity));
}

std::optional<Quantity> quantity_named(std::string_view name) {
  for (std::size_t i = 0; i < table.size(); ++i) {
    if (table.at(i).name == name) {
      return static_cast<Quantity>(i);
    }
  }
  return std::nullopt;
}

std::optional<Quantity> weight_of(Quantity ratio) {
  switch (ratio) {
    case Quantity::cop:
    case Quantity::second_law_efficiency: return Quantity::power;
    case Quantity::cop_reversible: return Quantity::reversible_power;
    case Quantity::power_residual: return Quantity::power_expected;
    default: return std::nullopt;
  }
}

Measured at_the_edge(Quantity quantity, const Measured& value_SI) {
  const QuantityInfo& q = info(quantity);
  return {.value = value_SI.value * q.per_SI + q.offset, .u = value_SI.u * q.per_SI};
}

}  // namespace lostwork
