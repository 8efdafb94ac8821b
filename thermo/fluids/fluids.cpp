#include "thermo/fluids/fluids.h"

#include "thermo/fluids/state.h"

#include <algorithm>
#include <array>

namespace lostwork {
namespace {

constexpr std::array<const Fluid*, 2> all{&r134a, &r718};

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
