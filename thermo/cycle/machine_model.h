// What the engine knows of a machine: made once from the plant file, never changed while it runs.
#pragma once

#include "thermo/fluids/state.h"
#include "thermo/measured.h"
#include "thermo/reading.h"
#include "thermo/role.h"
#include "thermo/streams/stream.h"

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

enum class Duty : std::uint8_t { cooling, heating };
enum class EvaporatorKind : std::uint8_t { dry, flooded };
enum class FlowPlace : std::uint8_t {
  in,
  out
};  // where a volume flow is metered: decides its density

struct ModelStream {
  StreamFluid fluid = WaterStream{};
  FlowPlace flow_at = FlowPlace::in;
};

struct ModelPoint {
  std::string id;
  Role role{};
  int circuit = 1;
  bool mass_flow = false;           // a flow in kg/s instead of m3/s
  std::optional<std::size_t> pair;  // index of the matched pair that it belongs to
  bool accuracy_known = true;       // false: u is that of the digits alone
  double shared_variance = 0.0;     // share 0..1 of u^2 that the points of one pair have in common
};

struct MachineModel {
  std::string id;    // "chiller-1"
  std::string name;  // "Chiller 1"
  Duty duty = Duty::cooling;
  EvaporatorKind evaporator = EvaporatorKind::dry;
  const Fluid* refrigerant = nullptr;  // never null in use; lives for ever
  ModelStream cold;
  ModelStream hot;
  double rated_power_W = 0.0;  // > 0
  // Heat from the casing as a share of the power, where it cannot be measured; 0.05 with limit 0.05
  // is engineering judgement without a published figure.
  Measured casing_loss{.value = 0.05, .u = 0.05 / 1.7320508075688772};
  std::optional<double>
      casing_T_K;  // surroundings of the casing; the reference temperature where unknown
  Span scan_period{10000};
  std::vector<ModelPoint> points;

  [[nodiscard]] std::optional<std::size_t> index_of(Role role) const;  // circuit 1
};

}  // namespace lostwork
