// The pure step that joins everything: one scan of one machine in; its assessment, closed windows,
// findings and alarms out.
//
// The live loop, the demonstration and the replay of a history all call it, so the same scans give
// the same results bit for bit. No clock, no file, no log. State moves through by value; it is
// stored with save() and taken up again with load(), which changes no later result.
#pragma once

#include "daemon/alarm.h"
#include "daemon/alarm_book.h"
#include "daemon/alarm_rules.h"
#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/health/health.h"
#include "thermo/measure/operation.h"
#include "thermo/measure/steady.h"
#include "thermo/measure/window.h"
#include "thermo/reading.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

struct StepModel {
  MachineModel machine;
  HealthModel health;  // of the same machine
  OperationOptions operation;
  SteadyOptions steady;
  AlarmRules alarms;
};
// The usual one: health is given the machine and the rules' tariff.
[[nodiscard]] StepModel step_model(MachineModel machine, AlarmRules rules);

// What became of a scan.
enum class ScanFate : std::uint8_t {
  taken = 0,
  doubled,      // of the time of the last one
  going_back,   // older than the last one
  wrong_shape,  // not as many readings as the model has points
  count
};
[[nodiscard]] std::string_view name(ScanFate fate);

struct MachineState {
  OperationState operation;
  SteadyState steady;
  HealthState health;
  AlarmBook alarms;
  std::vector<std::string> points;  // ids of the model that this state belongs to
  std::optional<Instant> last_scan;
  std::array<std::uint64_t, static_cast<std::size_t>(ScanFate::count)> scans{};  // by fate
};

struct MachineStep {
  MachineState next;
  ScanFate fate = ScanFate::taken;  // of any other nothing but the count has changed
  Assessment assessment;            // every value not_read where the scan was not taken
  std::vector<Window> windows;
  std::vector<Finding> findings;    // new or changed ones, whole
  std::vector<DailyResidual> days;  // closed by this scan
  std::vector<AlarmEvent> alarms;
};

[[nodiscard]] MachineStep advance(const StepModel& model, MachineState state, const Scan& scan);

// Of the layout of save()'s bytes; goes up with every change.
inline constexpr std::uint32_t machine_state_version = 2;

[[nodiscard]] std::vector<std::uint8_t> save(const MachineState& state);
// Damaged bytes and those of another version are refused with a sentence for the log. The state is
// fitted to the model.
[[nodiscard]] tl::expected<MachineState, std::string> load(const StepModel& model,
                                                           const std::vector<std::uint8_t>& bytes);

// After the plant file was read anew: what belongs to points that are still there is kept.
[[nodiscard]] MachineState fitted(const StepModel& model, MachineState state);

// The host's clock was set back to before the last scan: open windows and delays are forgotten,
// what was learned is kept, and scans from `now` on are taken again.
[[nodiscard]] MachineState clock_set_back(MachineState state, Instant now);

}  // namespace lostwork
