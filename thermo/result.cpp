#include "thermo/result.h"

#include <array>
#include <cstddef>

namespace lostwork {
namespace {

struct Words {
  std::string_view name;
  std::string_view text;
};

constexpr std::array<Words, static_cast<std::size_t>(ReasonCode::count)> words{
    {
     {"no_sensor", "a sensor is missing"},
     {"not_read", "not read"},
     {"bad_quality", "a reading is not good"},
     {"implausible", "a value cannot be right"},
     {"outside_fluid", "outside the range of the fluid's equation"},
     {"not_converged", "the calculation did not converge"},
     {"machine_off", "the machine is off"},
     {"not_needed", "no lift is needed: the heat would flow by itself"},
     {"lift_too_small", "the temperature lift is too small"},
     {"zero_flow", "no flow"},
     {"contradicts", "the readings contradict each other"},
     {"no_baseline", "still learning what is normal"},
     {"outside_baseline", "conditions that the baseline has not seen"},
     {"not_applicable", "has no meaning for this machine"},
     {"load_too_small", "the load is too small"},
     }
};

}  // namespace

std::string_view name(ReasonCode code) {
  return words.at(static_cast<std::size_t>(code)).name;
}
std::string_view text(ReasonCode code) {
  return words.at(static_cast<std::size_t>(code)).text;
}

}  // namespace lostwork
