// A machine whose truth is known: built forwards from its cycle, with none of the ledger's code.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/fluids/state.h"
#include "thermo/reading.h"
#include "thermo/role.h"

#include <cstddef>
#include <map>
#include <string_view>
#include <vector>

namespace lostwork::test {

// The cycle as its designer would state it.
struct Cycle {
  std::string_view refrigerant = "R134a";
  Duty duty = Duty::cooling;
  StreamFluid cold_fluid = ConstantStream{};
  StreamFluid hot_fluid = ConstantStream{};
  double cold_in_T_K = 285.15;
  double cold_out_T_K = 280.15;
  double hot_in_T_K = 303.15;
  double hot_out_T_K = 308.15;
  double evaporating_T_K = 278.15;
  double condensing_T_K = 311.15;
  double superheat_K = 5.0;  // at the compressor
  double line_gain_K = 0.0;  // of it, in the suction line
  double subcooling_K = 4.0;
  double isentropic_efficiency = 0.7;
  double casing_share = 0.02;  // of the power
  double flow_kgs = 2.0;       // refrigerant
};

// What happens in it. Entropy by the streams' own entropies, lost work by the entropy.
struct Truth {
  double power_W;
  double cold_heat_W;
  double hot_heat_W;
  double compressor_heat_W;  // from its casing
  double line_heat_W;        // into the suction line
  double cold_mean_T_K;
  double hot_mean_T_K;
  State suction;
  State discharge;
  State liquid;
  State valve_out;
  State evaporator_out;
};

using Values = std::map<Role, double>;

struct TestMachine {
  MachineModel model;
  Truth truth{};
  Values values;  // what perfect sensors would read
  Scan scan;      // the same, good, with the uncertainties that were asked for

  // A scan of other values; a role that is not in them is not read.
  [[nodiscard]] Scan scan_of(const Values& readings) const;
  Reading& reading(Role role);
  ModelPoint& point(Role role);
  void remove(Role role);  // the point, and its reading
};

// The standard uncertainty of every sensor.
struct Accuracy {
  double stream_T_K = 0.0;
  double refrigerant_T_K = 0.0;
  double pressure_Pa = 0.0;
  double flow_share = 0.0;
  double power_share = 0.0;
};

// All points but liquid.pressure; evaporator_out.temperature where the line gains heat.
[[nodiscard]] TestMachine make_machine(const Cycle& cycle, const Accuracy& accuracy = {});

// Of the quantity; fails the test where there is none.
[[nodiscard]] double value(const Assessment& assessment, Quantity quantity);
[[nodiscard]] double u(const Assessment& assessment, Quantity quantity);
// Of the refusal; fails the test where there is a value.
[[nodiscard]] Reason reason(const Assessment& assessment, Quantity quantity);

}  // namespace lostwork::test
