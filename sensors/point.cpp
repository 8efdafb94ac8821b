#include "sensors/point.h"

#include <cmath>

namespace lostwork {
namespace {

bool must_be_positive(Role role) {
  const Dimension kind = dimension(role);
  return kind == Dimension::temperature || kind == Dimension::pressure;
}

bool within(const std::optional<PointRange>& range, double value) {
  return std::isfinite(value) && (!range || (value >= range->min && value <= range->max));
}

}  // namespace

double offset_at(const PointSpec& point, Instant time) {
  double offset = 0.0;
  for (const CalibrationOffset& entry : point.calibrations) {
    if (entry.from > time) {
      break;
    }
    offset = entry.offset;
  }
  return offset;
}

double quantum(const PointSpec& point) {
  const auto* source = std::get_if<FromRegister>(&point.source);
  return source != nullptr && is_integer(source->at.type) ? std::abs(source->at.scale) : 0.0;
}

Reading reading_of(const PointSpec& point, double value, double altitude_m, Instant time) {
  if (!within(point.range, value)) {
    return missing(Quality::out_of_range, time);
  }
  const double value_SI = to_SI(point.unit, value + offset_at(point, time), altitude_m);
  if (must_be_positive(point.role) && !(value_SI > 0.0)) {
    return missing(Quality::out_of_range, time);
  }
  return {.value_SI = value_SI,
          .u_SI = standard_u_SI(point.accuracies, point.unit, value, quantum(point)),
          .quality = Quality::good,
          .time = time};
}

Reading missing(Quality quality, Instant time) {
  return {.value_SI = 0.0, .u_SI = 0.0, .quality = quality, .time = time};
}

}  // namespace lostwork
