#include "thermo/fluids/fluids.h"

#include "thermo/fluids/state.h"

#include <algorithm>
#include <array>

namespace lostwork {
namespace {

constexpr auto all = std::to_array<const Fluid*>(
    {&r134a, &r1234yf, &r1234ze_e, &r32,    &r125,  &r143a, &r152a, &r22,
     &r123,  &r245fa,  &r1233zd_e, &r227ea, &r13i1, &r290,  &r600,  &r600a,
     &r1270, &r717,    &r744,      &r410a,  &r407c, &r404a, &r507a, &r718});

}  // namespace

std::span<const Fluid* const> fluids() {
  return all;
}

const Fluid* fluid_named(std::string_view name) {
  const auto* const found = std::find_if(all.begin(), all.end(), [name](const Fluid* fluid) {
    return name == fluid->name || (!fluid->second_name.empty() && name == fluid->second_name);
  });
  return found == all.end() ? nullptr : *found;
}

}  // namespace lostwork
