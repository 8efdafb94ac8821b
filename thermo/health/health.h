// From steady windows to findings: baseline, daily residuals, drift charts, causes.
//
// Pure: state by value in and out, no clock. The same windows and times give the same findings bit
// for bit, whether or not the state went through an archive in between. One HealthState per
// machine. Windows come in the order of their end; one that ends before the last one is ignored.
//
// It proposes; it never protects: the machine's own safety devices do that.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/health/finding.h"
#include "thermo/health/health_state.h"
#include "thermo/measure/window.h"
#include "thermo/quantity.h"
#include "thermo/result.h"

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// Marks: [E] engineering judgement without a published figure; a setting.
struct HealthOptions {
  // The baseline's needs.
  std::uint32_t min_windows = 40;  // independent steady windows
  std::uint32_t min_days = 21;     // days with windows [E]: the day-to-day scatter needs them
  double min_load_span = 0.25;     // of the largest heat seen [E]
  double min_lift_span_K = 5.0;    // [E]
  double max_condition = 30.0;     // of the scaled regressors [E]
  // After so many days with windows the baseline is made of what was seen, however narrow; the
  // guards keep the rest out [E].
  std::uint32_t patience_days = 35;
  double max_autocorrelation = 0.3;  // between the windows used
  // Learning goes on in conditions not yet seen, while those seen stay as they were. It never
  // changes what was learned of conditions already seen by more than the fit's own scatter.
  bool extend = true;

  // Guards.
  double range_margin = 0.10;  // of the range seen, to either side

  // Drift.
  std::uint32_t min_day_windows = 3;           // for a daily residual [E]
  double false_alarms_per_machine_year = 1.0;  // over all charts
  double reference_value = 0.5;                // the charts' k, in sigma
  double smallest_drift = 0.02;                // of the power: below it nothing is said [E]
  double min_sigma = 0.01;                     // least day-to-day scatter assumed [E]
  double clear_margin = 3.0;                   // posterior ratio that names one cause
  // Accept a learned baseline without a person's word. Findings do not differ; the status says so.
  bool accept_unattended = true;
};

struct HealthTariff {
  std::optional<double> price_per_J;  // in currency; > 0
  std::string currency = "EUR";
  std::optional<double> co2_kg_per_J;
};

struct HealthModel {
  MachineModel machine;
  HealthTariff tariff;
  HealthOptions options;
};

struct DailyResidual {
  Instant day{};  // its beginning, UTC
  std::string baseline_id;
  Measured residual;           // (power - expected) / expected, weighted by energy; u: of the mean
  double energy_J = 0.0;       // of the windows compared
  std::uint32_t windows = 0;   // compared
  std::uint32_t excluded = 0;  // outside the baseline
  double chart = 0.0;          // the drift chart after this day, in sigma
  double chart_limit = 0.0;
};

struct HealthUpdate {
  HealthState next;
  std::vector<Finding> changed;            // new or changed findings, whole
  std::vector<DailyResidual> days_closed;  // most often none or one
};

[[nodiscard]] HealthUpdate take_window(const HealthModel& model, HealthState state,
                                       const Window& window);

// Closes the days that end at or before now, also when no window comes. Call it as time goes on;
// calling it more often changes nothing.
[[nodiscard]] HealthUpdate advance_time(const HealthModel& model, HealthState state, Instant now);

// Energy that the machine used in a stretch of one day that ends at `time`, steady or not: call it
// for every scan. Makes the cost of a drift that of all hours instead of that of the steady
// windows.
[[nodiscard]] HealthState take_energy(HealthState state, Instant time, double energy_J);

struct Expectation {
  Measured power_W;     // expected; u: of the prediction of one window, model and scatter
  double half_width_W;  // 95 % prediction interval: power_W.value +- half_width_W
  Measured residual;    // (power - expected) / expected
};

// For every scan: cheap. Refuses: no_baseline; outside_baseline; what the inputs refuse with.
[[nodiscard]] Result<Expectation> expected_power(const HealthState& state,
                                                 const QuantityValues& values);

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class LearningNeed : std::uint8_t {
  windows = 0,
  days = 1,
  load_span = 2,
  lift_span = 3,
  spread = 4,      // load and lift moved together: they cannot be told apart
  inputs = 5,      // power, a heat or a temperature is not measured
  acceptance = 6,  // learned; a person has to accept it
  fit = 7,         // the windows scatter too much about any smooth curve
  laws = 8,        // the readings break the first or the second law
  count
};
[[nodiscard]] std::string_view name(LearningNeed need);
[[nodiscard]] std::string_view text(LearningNeed need);  // "needs hours at other loads"

struct LearningStatus {
  bool learned = false;
  std::string baseline_id;  // of the one in force; empty while learning
  bool unattended = false;  // accepted without a person
  bool narrow = false;      // load or lift span below what is wanted: more is "outside"
  std::uint32_t windows = 0;
  std::uint32_t days = 0;
  double load_span = 0.0;  // of the largest heat seen
  double lift_span_K = 0.0;
  double min_heat_W = 0.0;  // seen
  double max_heat_W = 0.0;
  double min_lift_K = 0.0;
  double max_lift_K = 0.0;
  std::vector<LearningNeed> missing;
};
[[nodiscard]] LearningStatus learning_status(const HealthModel& model, const HealthState& state);
// "24 of 40 steady windows on 9 of 21 days; needs hours at other loads"
[[nodiscard]] std::string text(const LearningStatus& status, const HealthOptions& options);

// A person accepts the learned baseline.
[[nodiscard]] HealthState accept_baseline(HealthState state);
// After service (cleaned, charged, part replaced): a new baseline is learned from now on. Open
// findings end, but for a broken law, which rests on no baseline.
[[nodiscard]] HealthUpdate begin_learning(const HealthModel& model, HealthState state, Instant now);

// Findings that are not over.
[[nodiscard]] std::vector<Finding> open_findings(const HealthState& state);

}  // namespace lostwork
