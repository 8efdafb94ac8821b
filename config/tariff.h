// What electricity costs the site.
#pragma once

#include <optional>
#include <string>

namespace lostwork {

struct Tariff {
  std::optional<double> price_per_kWh;  // >= 0; none: no money is shown
  std::string currency = "EUR";
  std::optional<double> co2_kg_per_kWh;  // >= 0; none: no CO2 is shown
};

}  // namespace lostwork
