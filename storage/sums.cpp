#include "storage/sums.h"

#include <algorithm>
#include <cmath>
#include <optional>

namespace lostwork {
namespace {

// weight_of() for every quantity, looked up once: this runs for each scan.
constexpr std::size_t no_weight = quantity_count;

std::array<std::size_t, quantity_count> weight_places() {
  std::array<std::size_t, quantity_count> out{};
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const std::optional<Quantity> weight = weight_of(static_cast<Quantity>(i));
    out.at(i) = weight ? static_cast<std::size_t>(*weight) : no_weight;
  }
  return out;
}

bool is_finite(const Measured& value) {
  return std::isfinite(value.value) && std::isfinite(value.u);
}

double weight(const QuantityValues& values, std::size_t place) {
  static const auto places = weight_places();
  if (places.at(place) == no_weight) {
    return 1.0;
  }
  const Result<Measured>& denominator = values[static_cast<Quantity>(places.at(place))];
  return denominator && denominator->value > 0.0 && is_finite(*denominator) ? denominator->value
                                                                            : 1.0;
}

void add_value(QuantitySums& sums, const Measured& value, double weight) {
  const auto u = static_cast<double>(static_cast<float>(value.u));
  sums.min = sums.count == 0 ? value.value : std::min(sums.min, value.value);
  sums.max = sums.count == 0 ? value.value : std::max(sums.max, value.value);
  sums.sum += weight * value.value;
  sums.u_sum += weight * u;
  sums.weight += weight;
  ++sums.count;
}

}  // namespace

Result<Measured> QuantitySums::mean() const {
  if (count == 0) {
    return tl::unexpected{reason};
  }
  if (count == 1) {
    return Measured{.value = min, .u = static_cast<double>(static_cast<float>(u_sum / weight))};
  }
  return Measured{.value = sum / weight, .u = u_sum / weight};
}

void add(PeriodSums& sums, const Assessment& assessment, Span covers) {
  const bool newest = sums.scans == 0 || assessment.time >= sums.newest;
  ++sums.scans;
  sums.steady_scans += assessment.steady ? 1U : 0U;
  sums.covered_ms += static_cast<std::uint64_t>(covers.count());
  if (newest) {
    sums.newest = assessment.time;
    sums.mode = assessment.mode;
    sums.level = assessment.level;
  }
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const Result<Measured>& value = assessment.values[static_cast<Quantity>(i)];
    QuantitySums& quantity = sums.quantities.at(i);
    if (value && is_finite(*value)) {
      add_value(quantity, *value, weight(assessment.values, i));
    } else if (newest && quantity.count == 0) {
      quantity.reason =
          value ? Reason{.code = ReasonCode::implausible, .blame = {}} : value.error();
    }
  }
}

void add(PeriodSums& sums, const PeriodSums& more) {
  if (more.scans == 0) {
    return;
  }
  const bool newest = sums.scans == 0 || more.newest >= sums.newest;
  sums.scans += more.scans;
  sums.steady_scans += more.steady_scans;
  sums.covered_ms += more.covered_ms;
  if (newest) {
    sums.newest = more.newest;
    sums.mode = more.mode;
    sums.level = more.level;
  }
  for (std::size_t i = 0; i < quantity_count; ++i) {
    QuantitySums& into = sums.quantities.at(i);
    const QuantitySums& from = more.quantities.at(i);
    if (from.count > 0) {
      into.min = into.count == 0 ? from.min : std::min(into.min, from.min);
      into.max = into.count == 0 ? from.max : std::max(into.max, from.max);
      into.sum += from.sum;
      into.u_sum += from.u_sum;
      into.weight += from.weight;
      into.count += from.count;
    } else if (newest) {
      into.reason = from.reason;
    }
  }
}

}  // namespace lostwork
