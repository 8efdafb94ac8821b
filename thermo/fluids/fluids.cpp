#include "thermo/fluids/fluids.h"

#include "thermo/fluids/state.h"

#include <algorithm>
#include <array>
#include <string>

namespace lostwork {
namespace {

constexpr auto all = std::to_array<const Fluid*>(
    {&r134a, &r1234yf, &r1234ze_e, &r32,    &r125,  &r143a, &r152a, &r22,
     &r123,  &r245fa,  &r1233zd_e, &r227ea, &r13i1, &r290,  &r600,  &r600a,
     &r1270, &r717,    &r744,      &r410a,  &r407c, &r404a, &r507a, &r718});

// The letters and digits of a name, small.
std::string plain(std::string_view name) {
  std::string out;
  for (const char c : name) {
    if (c >= 'A' && c <= 'Z') {
      out += static_cast<char>(c - 'A' + 'a');
    } else if ((c >= 'a' && c <= 'z') || (c >= '0' && c <= '9')) {
      out += c;
    }
  }
  return out;
}

}  // namespace

std::span<const Fluid* const> fluids() {
  return all;
}

const Fluid* fluid_named(std::string_view name) {
  const std::string wanted = plain(name);
  const auto* const found = std::find_if(all.begin(), all.end(), [&wanted](const Fluid* fluid) {
    return !wanted.empty() && (wanted == plain(fluid->name) || wanted == plain(fluid->second_name));
  });
  return found == all.end() ? nullptr : *found;
}

}  // namespace lostwork
