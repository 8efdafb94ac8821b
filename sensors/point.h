// One measured thing: where it comes from, and the pure way from a value to a Reading.
#pragma once

#include "sensors/accuracy.h"
#include "sensors/decode.h"
#include "sensors/unit.h"
#include "thermo/reading.h"
#include "thermo/role.h"

#include <optional>
#include <string>
#include <variant>
#include <vector>

namespace lostwork {

struct FileOnly {};  // comes from a CSV only; live, it is never read
struct FromRegister {
  std::string device{};
  RegisterSpec at{};
};
struct Constant {
  double value;  // in the point's unit
};
using PointSource = std::variant<FileOnly, FromRegister, Constant>;

struct PointRange {
  double min;  // in the point's unit, both ends belong to it
  double max;
};

// Added to the value, in the point's unit, for readings from `from` on until the next entry.
struct CalibrationOffset {
  Instant from;
  double offset;
};

struct PointSpec {
  std::string id{};
  std::string machine{};
  Role role{};
  int circuit = 1;
  Unit unit = Unit::one;
  std::vector<Accuracy> accuracies{};
  std::string pair{};  // empty: none
  std::optional<PointRange> range{};
  std::vector<CalibrationOffset> calibrations{};  // by rising `from`
  PointSource source = FileOnly{};
};

// Offset in the point's unit that holds at `time`; 0 before the first entry.
[[nodiscard]] double offset_at(const PointSpec& point, Instant time);

// Step of the digital value in the point's unit: |scale| of an integer register, else 0.
[[nodiscard]] double quantum(const PointSpec& point);

// A value in the point's unit, from a register or a CSV, as a Reading: offset added, to SI, with
// its uncertainty. out_of_range: not finite, outside the range (tested on what the sensor said,
// before the offset), or an absolute temperature or pressure that is not above 0.
[[nodiscard]] Reading reading_of(const PointSpec& point, double value, double altitude_m,
                                 Instant time);

// A reading without a value.
[[nodiscard]] Reading missing(Quality quality, Instant time);

}  // namespace lostwork
