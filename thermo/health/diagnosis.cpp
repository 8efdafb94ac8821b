#include "thermo/health/diagnosis.h"

#include "thermo/health/traces.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace lostwork {
namespace {

// What was seen of one feature, in natural units.
struct Seen {
  std::size_t feature;
  double value;
  double variance;
};

std::vector<Seen> seen_of(const Shift& shift) {
  std::vector<Seen> out;
  for (std::size_t i = 0; i < feature_count; ++i) {
    const auto feature = static_cast<Feature>(i);
    if (const auto& s = shift.at(i); s && compared(feature)) {
      const double natural = info(feature).natural;
      const double u = s->u / natural;
      out.push_back({.feature = i, .value = s->value / natural, .variance = u * u});
    }
  }
  return out;
}

double log_likelihood(const std::vector<Seen>& seen, const Trace& trace, double amount) {
  double sum = 0.0;
  for (const Seen& s : seen) {
    const double tolerance = amount * trace.tolerance.at(s.feature);
    const double variance = s.variance + tolerance * tolerance;
    const double off = s.value - amount * trace.mean.at(s.feature);
    sum -= 0.5 * (off * off / variance + std::log(variance));
  }
  return sum;
}

struct Best {
  double amount;
  double log_likelihood;
};

Best better(const Best& best, const std::vector<Seen>& seen, const Trace& trace, double amount) {
  const double l = log_likelihood(seen, trace, amount);
  return l > best.log_likelihood ? Best{.amount = amount, .log_likelihood = l} : best;
}

// Scans amounts a tenth apart in ratio, then narrows about the best.
Best best_amount(const std::vector<Seen>& seen, const Trace& trace) {
  Best best{.amount = 0.0, .log_likelihood = -std::numeric_limits<double>::infinity()};
  double amount = 0.01;
  while (amount < 200.0) {
    best = better(best, seen, trace, amount);
    amount *= 1.1;
  }
  double ratio = 1.05;
  for (int i = 0; i < 12; ++i) {
    for (const double factor : {ratio, 1.0 / ratio}) {
      best = better(best, seen, trace, best.amount * factor);
    }
    ratio = std::sqrt(ratio);
  }
  return best;
}

double amount_u(const std::vector<Seen>& seen, const Trace& trace, double amount) {
  double information = 0.0;
  for (const Seen& s : seen) {
    const double tolerance = amount * trace.tolerance.at(s.feature);
    const double mean = trace.mean.at(s.feature);
    information += mean * mean / (s.variance + tolerance * tolerance);
  }
  return information > 0.0 ? 1.0 / std::sqrt(information) : 0.0;
}

// Whether the cause can be seen at all in what was compared.
bool visible(const std::vector<Seen>& seen, const Trace& trace) {
  double largest = 0.0;
  double seen_largest = 0.0;
  for (std::size_t f = 0; f < feature_count; ++f) {
    largest =
        compared(static_cast<Feature>(f)) ? std::max(largest, std::abs(trace.mean.at(f))) : largest;
  }
  for (const Seen& s : seen) {
    seen_largest = std::max(seen_largest, std::abs(trace.mean.at(s.feature)));
  }
  return seen_largest > 0.3 * largest;
}

struct Weighed {
  RankedCause cause;
  double log_likelihood;
};

std::optional<Weighed> weigh(const std::vector<Seen>& seen, const Trace& trace) {
  if (!visible(seen, trace)) {
    return std::nullopt;
  }
  const Best best = best_amount(seen, trace);
  return Weighed{
      .cause = {.cause = trace.cause,
                .role = trace.role,
                .probability = 0.0,
                .amount_SI = {.value = best.amount * trace.unit_SI,
                .u = amount_u(seen, trace, best.amount) * std::abs(trace.unit_SI)}},
      .log_likelihood = best.log_likelihood
  };
}

// A cause with several traces counts once, with the one that fits best.
void keep_better(std::vector<Weighed>& all, const Weighed& weighed) {
  const auto same = std::find_if(all.begin(), all.end(), [&](const Weighed& w) {
    return w.cause.cause == weighed.cause.cause && w.cause.role == weighed.cause.role;
  });
  if (same == all.end()) {
    all.push_back(weighed);
  } else if (weighed.log_likelihood > same->log_likelihood) {
    *same = weighed;
  }
}

struct SensorBias {
  Input input;
  double bias_SI;
};

std::vector<SensorBias> first_biases(const Inputs& inputs) {
  std::vector<SensorBias> out;
  for (std::size_t i = 0; i < input_count; ++i) {
    const auto input = static_cast<Input>(i);
    if (inputs[input]) {
      const double bias_SI = first_bias_SI(input, *inputs[input]);
      out.push_back({.input = input, .bias_SI = bias_SI});
      out.push_back({.input = input, .bias_SI = -bias_SI});
    }
  }
  return out;
}

// A bias of the sensor with that sign: searched along the trace of a first bias, then along that of
// the bias found, for heats and approaches do not follow a large one in proportion. A bias whose
// removal leaves the fluid or the heat ends the search with the one before.
std::optional<Weighed> weigh_sensor(const std::vector<Seen>& seen, const MachineModel& machine,
                                    const Baseline& baseline, const Inputs& inputs,
                                    const SensorBias& first) {
  constexpr int rounds = 6;
  constexpr double near_enough = 0.02;
  std::optional<Weighed> weighed;
  double bias_SI = first.bias_SI;
  for (int round = 0; round < rounds; ++round) {
    const auto trace = sensor_trace(machine, baseline, inputs, first.input, bias_SI);
    const auto next = trace ? weigh(seen, *trace) : std::nullopt;
    if (!next) {
      break;
    }
    weighed = next;
    const double found_SI = next->cause.amount_SI.value;
    if (std::abs(found_SI - bias_SI) <= near_enough * std::abs(bias_SI)) {
      break;
    }
    bias_SI = found_SI;
  }
  return weighed;
}

double log_likelihood_of_nothing(const std::vector<Seen>& seen) {
  return log_likelihood(seen, Trace{}, 0.0);
}

// Half the square of three and a half standard deviations: one amount was chosen out of many.
constexpr double beyond_chance = 6.0;

}  // namespace

bool compared(Feature feature) {
  return feature != Feature::power && feature != Feature::subcooling &&
         feature < Feature::lost_compressor;
}

Diagnosis diagnose(const MachineModel& machine, const Baseline& baseline,
                   const DiagnosisInput& input, double margin) {
  const std::vector<Seen> seen = seen_of(input.shift);
  std::vector<Weighed> all;
  for (const Trace& trace : machine_traces()) {
    if (const auto weighed = weigh(seen, trace)) {
      keep_better(all, *weighed);
    }
  }
  for (const SensorBias& first : first_biases(input.inputs)) {
    if (const auto weighed = weigh_sensor(seen, machine, baseline, input.inputs, first)) {
      keep_better(all, *weighed);
    }
  }
  std::stable_sort(all.begin(), all.end(), [](const Weighed& a, const Weighed& b) {
    return a.log_likelihood > b.log_likelihood;
  });
  Diagnosis out;
  if (all.empty()) {
    return out;
  }
  const double top = all.front().log_likelihood;
  double sum = 0.0;
  for (const Weighed& w : all) {
    sum += std::exp(w.log_likelihood - top);
  }
  for (Weighed& w : all) {
    w.cause.probability = std::exp(w.log_likelihood - top) / sum;
    out.causes.push_back(w.cause);
  }
  out.explained = top - log_likelihood_of_nothing(seen) > beyond_chance;
  out.clear = out.explained &&
              (all.size() < 2 || out.causes[0].probability >= margin * out.causes[1].probability);
  return out;
}

}  // namespace lostwork
