#include "thermo/health/learning.h"

#include "thermo/health/diagnosis.h"
#include "thermo/health/laws.h"
#include "thermo/health/open_finding.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <cstdio>
#include <utility>

namespace lostwork {
namespace {

// Windows nearer than this tell the same story twice [E].
constexpr Span apart = std::chrono::hours{2};
constexpr std::size_t most_samples = 480;
constexpr std::size_t most_newcomers = 240;

// An extension needs so many newcomers on so many days [E].
constexpr std::size_t newcomers_needed = 12;
constexpr std::size_t newcomer_days_needed = 3;
// What was learned holds when the days compared of the last fortnight are within this, and the
// newcomers within twice of it about the baseline's continuation [E].
constexpr std::int64_t holding_days = 14;
constexpr std::uint32_t holding_least = 3;

// A fit whose windows scatter more than this tells nothing of a drift of 2 % [E].
constexpr double most_scatter = 0.08;

struct Spans {
  AxisRange heat_W;
  AxisRange lift_K;
  double condition = 1.0;
};

double lift_K(const Conditions& c) {
  return c.lift * c.product_T_K;
}

// Condition number of two centred and scaled regressors: sqrt((1 + |r|) / (1 - |r|)).
double condition_of(const std::vector<Sample>& samples) {
  double n = 0.0;
  double mean_q = 0.0;
  double mean_l = 0.0;
  double qq = 0.0;
  double ll = 0.0;
  double ql = 0.0;
  for (const Sample& s : samples) {
    n += 1.0;
    const double q = s.conditions.heat_W - mean_q;
    const double l = s.conditions.lift - mean_l;
    mean_q += q / n;
    mean_l += l / n;
    qq += q * (s.conditions.heat_W - mean_q);
    ll += l * (s.conditions.lift - mean_l);
    ql += q * (s.conditions.lift - mean_l);
  }
  if (!(qq > 0.0) || !(ll > 0.0)) {
    return 1.0;
  }
  const double r = std::min(std::abs(ql) / std::sqrt(qq * ll), 1.0 - 1e-12);
  return std::sqrt((1.0 + r) / (1.0 - r));
}

Spans spans_of(const std::vector<Sample>& samples) {
  Spans spans;
  bool first = true;
  for (const Sample& s : samples) {
    const double q = s.conditions.heat_W;
    const double l = lift_K(s.conditions);
    spans.heat_W = first ? AxisRange{.min = q, .max = q}
                         : AxisRange{.min = std::min(q, spans.heat_W.min),
                                     .max = std::max(q, spans.heat_W.max)};
    spans.lift_K = first ? AxisRange{.min = l, .max = l}
                         : AxisRange{.min = std::min(l, spans.lift_K.min),
                                     .max = std::max(l, spans.lift_K.max)};
    first = false;
  }
  spans.condition = condition_of(samples);
  return spans;
}

double load_span(const Spans& spans) {
  return spans.heat_W.max > 0.0 ? (spans.heat_W.max - spans.heat_W.min) / spans.heat_W.max : 0.0;
}

// What the samples lack in range; counts are judged apart.
std::vector<LearningNeed> missing_range(const HealthOptions& options, const Spans& spans) {
  std::vector<LearningNeed> missing;
  if (load_span(spans) < options.min_load_span) {
    missing.push_back(LearningNeed::load_span);
  }
  if (spans.lift_K.max - spans.lift_K.min < options.min_lift_span_K) {
    missing.push_back(LearningNeed::lift_span);
  }
  if (spans.condition > options.max_condition) {
    missing.push_back(LearningNeed::spread);
  }
  return missing;
}

std::vector<LearningNeed> missing_counts(const HealthOptions& options, const HealthState& state) {
  std::vector<LearningNeed> missing;
  if (state.samples.size() < options.min_windows) {
    missing.push_back(LearningNeed::windows);
  }
  if (state.learning_days.size() < options.min_days) {
    missing.push_back(LearningNeed::days);
  }
  return missing;
}

bool patient_enough(const HealthOptions& options, const HealthState& state) {
  return state.learning_days.size() >= options.patience_days;
}

std::string baseline_id(const HealthModel& model, const HealthState& state) {
  return model.machine.id + ".b" + std::to_string(state.generation) + "." +
         std::to_string(state.extension);
}

// One-sided charts that are all watched: the power, and both sides of each feature compared.
double charts_watched(const Baseline& baseline) {
  double charts = 1.0;
  for (std::size_t i = 0; i < feature_count; ++i) {
    const bool watched = compared(static_cast<Feature>(i)) && !baseline.fits.at(i).x.empty();
    charts += watched ? 2.0 : 0.0;
  }
  return charts;
}

double chart_limit(const HealthModel& model, const Baseline& baseline) {
  const double budget = std::max(model.options.false_alarms_per_machine_year, 1e-3);
  return limit_for(model.options.reference_value, 365.0 * charts_watched(baseline) / budget, 0.0);
}

Result<Baseline> made(const HealthModel& model, const HealthState& state) {
  auto baseline =
      fit_baseline(model.machine.duty, state.samples,
                   {.margin = model.options.range_margin, .min_sigma = model.options.min_sigma});
  if (baseline) {
    baseline->id = baseline_id(model, state);
    baseline->narrow = !missing_range(model.options, spans_of(state.samples)).empty();
  }
  return baseline;
}

// The days that the baseline was made of, against it: they bound the onset of a later drift.
void record_learning_days(HealthState& state) {
  std::optional<DaySums> sums;
  for (const Sample& sample : state.samples) {
    const std::int64_t day = day_number(sample.end);
    if (sums && sums->day != day) {
      state.days.push_back(closed(*sums));
      sums.reset();
    }
    if (!sums) {
      sums = DaySums{.day = day};
    }
    add_window(*sums, *state.baseline, sample, Inputs{});
  }
  if (sums) {
    state.days.push_back(closed(*sums));
  }
}

bool far_enough(const std::vector<Sample>& kept, const Sample& sample) {
  return kept.empty() || sample.end - kept.back().end >= apart;
}

// Keeps the first and every other one after it.
void thin(std::vector<Sample>& samples) {
  std::vector<Sample> kept;
  for (std::size_t i = 0; i < samples.size(); i += 2) {
    kept.push_back(samples[i]);
  }
  samples = std::move(kept);
}

// The last fortnight's days against the baseline: nothing where there were too few of them.
std::optional<double> mean_of_last_days(const HealthState& state) {
  double sum = 0.0;
  std::uint32_t count = 0;
  for (auto day = state.days.rbegin();
       day != state.days.rend() && day->day > state.days.back().day - holding_days; ++day) {
    if (const auto& r = (*day)[Feature::power]) {
      sum += *r;
      ++count;
    }
  }
  if (count < holding_least) {
    return std::nullopt;
  }
  return sum / count;
}

std::size_t days_in(const std::vector<Sample>& samples) {
  std::size_t count = 0;
  std::int64_t last = -1;
  for (const Sample& sample : samples) {
    const std::int64_t day = day_number(sample.end);
    count += day != last ? 1 : 0;
    last = day;
  }
  return count;
}

double mean_residual(const Baseline& baseline, const std::vector<Sample>& samples) {
  double sum = 0.0;
  double count = 0.0;
  for (const Sample& sample : samples) {
    if (const auto r = residual(baseline, Feature::power, sample)) {
      sum += *r;
      count += 1.0;
    }
  }
  return count > 0.0 ? sum / count : 0.0;
}

bool charts_quiet(const HealthState& state) {
  const double half = 0.5 * state.baseline->chart_limit;
  return state.charts[0].up.sum < half && state.charts[0].down.sum < half;
}

}  // namespace

void gather(HealthState& state, const Sample& sample) {
  const std::int64_t day = day_number(sample.end);
  if (state.learning_days.empty() || state.learning_days.back() != day) {
    state.learning_days.push_back(day);
  }
  if (far_enough(state.samples, sample)) {
    state.samples.push_back(sample);
  }
  if (state.samples.size() > most_samples) {
    thin(state.samples);
  }
}

void learn(const HealthModel& model, HealthState& state) {
  const HealthOptions& options = model.options;
  if (!missing_counts(options, state).empty()) {
    return;
  }
  if (!missing_range(options, spans_of(state.samples)).empty() && !patient_enough(options, state)) {
    return;
  }
  auto baseline = made(model, state);
  if (!baseline || (*baseline)[Feature::power].scatter > most_scatter ||
      (baseline->independent_windows < options.min_windows && !patient_enough(options, state))) {
    return;
  }
  baseline->chart_limit = chart_limit(model, *baseline);
  state.baseline = std::move(*baseline);
  state.accepted = options.accept_unattended;
  state.unattended = options.accept_unattended;
  record_learning_days(state);
}

void gather_newcomer(HealthState& state, const Sample& sample) {
  if (far_enough(state.newcomers, sample)) {
    state.newcomers.push_back(sample);
  }
  if (state.newcomers.size() > most_newcomers) {
    thin(state.newcomers);
  }
}

void extend(const HealthModel& model, HealthState& state) {
  if (!model.options.extend || !state.findings.empty() || !charts_quiet(state) ||
      state.newcomers.size() < newcomers_needed ||
      days_in(state.newcomers) < newcomer_days_needed) {
    return;
  }
  const double allowed = 0.5 * model.options.smallest_drift;
  const auto last_days = mean_of_last_days(state);
  if (!last_days || std::abs(*last_days) > allowed ||
      std::abs(mean_residual(*state.baseline, state.newcomers)) > 2.0 * allowed) {
    return;
  }
  HealthState wider = state;
  wider.samples.insert(wider.samples.end(), state.newcomers.begin(), state.newcomers.end());
  std::stable_sort(wider.samples.begin(), wider.samples.end(),
                   [](const Sample& a, const Sample& b) { return a.end < b.end; });
  if (wider.samples.size() > most_samples) {
    thin(wider.samples);
  }
  wider.newcomers.clear();
  ++wider.extension;
  auto baseline = made(model, wider);
  if (!baseline || (*baseline)[Feature::power].scatter > most_scatter) {
    return;
  }
  baseline->chart_limit = state.baseline->chart_limit;
  wider.baseline = std::move(*baseline);
  state = std::move(wider);
}

std::string_view name(LearningNeed need) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(LearningNeed::count)>
      names{"windows", "days",       "load_span", "lift_span", "spread",
            "inputs",  "acceptance", "fit",       "laws"};
  return names.at(static_cast<std::size_t>(need));
}

std::string_view text(LearningNeed need) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(LearningNeed::count)>
      texts{"needs more steady hours",
            "needs more days",
            "needs hours at other loads",
            "needs warmer or colder weather",
            "needs high load in mild weather, or low load in hot weather",
            "needs power, product heat and stream temperatures",
            "waits for a person to accept what was learned",
            "the steady hours do not lie on one smooth curve yet",
            "needs readings that do not break the first or the second law"};
  return texts.at(static_cast<std::size_t>(need));
}

LearningStatus learning_status(const HealthModel& model, const HealthState& state) {
  const Spans spans = spans_of(state.samples);
  LearningStatus status{.learned = state.baseline && state.accepted,
                        .baseline_id = state.baseline ? state.baseline->id : "",
                        .unattended = state.unattended,
                        .narrow = state.baseline && state.baseline->narrow,
                        .windows = static_cast<std::uint32_t>(state.samples.size()),
                        .days = static_cast<std::uint32_t>(state.learning_days.size()),
                        .load_span = load_span(spans),
                        .lift_span_K = spans.lift_K.max - spans.lift_K.min,
                        .min_heat_W = spans.heat_W.min,
                        .max_heat_W = spans.heat_W.max,
                        .min_lift_K = spans.lift_K.min,
                        .max_lift_K = spans.lift_K.max,
                        .missing = {}};
  if (state.baseline) {
    if (!state.accepted) {
      status.missing.push_back(LearningNeed::acceptance);
    }
    return status;
  }
  status.missing = missing_counts(model.options, state);
  if (open_of(state, FindingKind::law_broken) || (state.samples.empty() && any_broken(state))) {
    status.missing.push_back(LearningNeed::laws);
  } else if (state.samples.empty() && state.last_window_end) {
    status.missing.push_back(LearningNeed::inputs);
  }
  if (!patient_enough(model.options, state)) {
    const auto range = missing_range(model.options, spans);
    status.missing.insert(status.missing.end(), range.begin(), range.end());
  }
  if (status.missing.empty()) {
    status.missing.push_back(LearningNeed::fit);
  }
  return status;
}

std::string text(const LearningStatus& status, const HealthOptions& options) {
  if (status.learned) {
    return status.narrow ? "learned, in a narrow range of load or weather" : "learned";
  }
  std::string out = std::to_string(status.windows) + " of " + std::to_string(options.min_windows) +
                    " steady windows on " + std::to_string(status.days) + " of " +
                    std::to_string(options.min_days) + " days";
  for (const LearningNeed need : status.missing) {
    if (need != LearningNeed::windows && need != LearningNeed::days) {
      out += "; ";
      out += text(need);
    }
  }
  return out;
}

}  // namespace lostwork
