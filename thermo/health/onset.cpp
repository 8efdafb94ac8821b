#include "thermo/health/onset.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <cstddef>
#include <limits>

namespace lostwork {
namespace {

// clamp((t - onset) / length, 0, 1)^bend; length 0 is a step, a very long one never ends.
struct Shape {
  double length;
  double bend;
};

constexpr double endless = 1e4;
// Lengths a sixth to a half apart: a ramp that ends between two is fitted by both, and the interval
// covers the rest [E].
constexpr auto shapes = std::to_array<Shape>({
    {    0.0,  1.0},
    {    2.0,  1.0},
    {    3.0,  1.0},
    {    4.0,  1.0},
    {    5.0,  1.0},
    {    6.5,  1.0},
    {    8.0,  1.0},
    {   10.0,  1.0},
    {   12.0,  1.0},
    {   14.0,  1.0},
    {   17.0,  1.0},
    {   20.0,  1.0},
    {   24.0,  1.0},
    {   28.0,  1.0},
    {   33.0,  1.0},
    {   38.0,  1.0},
    {   45.0,  1.0},
    {   55.0,  1.0},
    {   70.0,  1.0},
    {   90.0,  1.0},
    {  120.0,  1.0},
    {endless,  0.5},
    {endless, 0.75},
    {endless,  1.0},
    {endless,  1.5},
    {endless,  2.0},
});

// Largest rise believed before the figures are seen: half of the power, as a standard deviation.
constexpr double rise_u = 0.5;
// Onsets are tried at the beginning and in the middle of each day.
constexpr double onset_step = 0.5;

double rise(const Shape& shape, double since) {
  if (since <= 0.0) {
    return 0.0;
  }
  if (shape.length <= 0.0) {
    return 1.0;
  }
  return std::pow(std::min(since / shape.length, 1.0), shape.bend);
}

// Weighted sums of a fit r = c + a g; weights 1 / (u / scatter)^2, g scaled to 1 on the last day.
struct Sums {
  double w = 0.0;
  double g = 0.0;
  double gg = 0.0;
  double r = 0.0;
  double rg = 0.0;
  double rr = 0.0;
};

struct Candidate {
  double onset;
  double log_weight;
  double offset;
  double size;  // of the rise on the last day
  double size_u;
  std::size_t shape;
  double scale;  // of g
};

struct Problem {
  const std::vector<DayValue>* days;
  std::vector<double> weight;
  OnsetPrior prior;
  double inflation;  // of the variance, by autocorrelation: fewer days than there seem to be
  Sums constant;     // w, r and rr of all days
  std::vector<std::vector<double>> rises;  // by shape and half days since the onset
};

// Half days from the onset, itself counted in half days, to the middle of a day; <= 0: before.
std::int64_t half_days(std::int64_t day, std::int64_t onset) {
  return 2 * day + 1 - onset;
}

Sums sums_of(const Problem& problem, std::size_t shape, std::int64_t onset, double scale) {
  Sums s = problem.constant;
  const std::vector<double>& rises = problem.rises[shape];
  for (std::size_t i = problem.weight.size(); i-- > 0;) {
    const DayValue& day = (*problem.days)[i];
    const std::int64_t since = half_days(day.day, onset);
    if (since <= 0) {
      break;
    }
    const double g = rises[static_cast<std::size_t>(since)] / scale;
    const double wg = problem.weight[i] * g;
    s.g += wg;
    s.gg += wg * g;
    s.rg += wg * day.residual;
  }
  return s;
}

double log_normal_above_zero(double mean, double u) {
  return std::log(std::max(0.5 * std::erfc(-mean / (u * std::sqrt(2.0))), 1e-300));
}

// Normal-inverse-gamma: offset ~ N(0, offset_u), rise ~ N(0, rise_u), both in units of the scatter.
Candidate weigh(const Problem& problem, std::size_t shape, std::int64_t onset, double scale) {
  const Sums raw = sums_of(problem, shape, onset, scale);
  const double s0 = problem.prior.scatter;
  const double less = 1.0 / problem.inflation;
  const double c_precision = s0 * s0 / (problem.prior.offset_u * problem.prior.offset_u);
  const double a_precision = s0 * s0 / (rise_u * rise_u);
  const double cc = raw.w * less + c_precision;
  const double ca = raw.g * less;
  const double aa = raw.gg * less + a_precision;
  const double determinant = cc * aa - ca * ca;
  const double offset = (aa * raw.r - ca * raw.rg) * less / determinant;
  const double size = (cc * raw.rg - ca * raw.r) * less / determinant;
  const double misfit = raw.rr * less - (offset * raw.r + size * raw.rg) * less;
  const double half_freedom =
      0.5 * (problem.prior.scatter_days + static_cast<double>(problem.weight.size()) * less);
  const double sum = problem.prior.scatter_days * s0 * s0 + std::max(misfit, 0.0);
  const double variance = sum / (2.0 * half_freedom);
  const double size_u = std::sqrt(variance * cc / determinant);
  const double log_weight = -half_freedom * std::log(sum) -
                            0.5 * std::log(determinant / (c_precision * a_precision)) +
                            log_normal_above_zero(size, size_u);
  return {.onset = onset_step * static_cast<double>(onset),
          .log_weight = log_weight,
          .offset = offset,
          .size = size,
          .size_u = size_u,
          .shape = shape,
          .scale = scale};
}

std::vector<Candidate> candidates(const Problem& problem) {
  std::vector<Candidate> all;
  const std::int64_t first = 2 * problem.days->front().day;
  const std::int64_t last = problem.days->back().day;
  for (std::size_t shape = 0; shape < shapes.size(); ++shape) {
    for (std::int64_t onset = first; half_days(last, onset) > 0; ++onset) {
      const double scale = problem.rises[shape][static_cast<std::size_t>(half_days(last, onset))];
      all.push_back(weigh(problem, shape, onset, scale));
    }
  }
  return all;
}

const Candidate& best_of(const std::vector<Candidate>& all) {
  return *std::max_element(all.begin(), all.end(), [](const Candidate& a, const Candidate& b) {
    return a.log_weight < b.log_weight;
  });
}

double autocorrelation_left(const Problem& problem, const Candidate& fit) {
  double product = 0.0;
  double square = 0.0;
  double before = 0.0;
  for (std::size_t i = 0; i < problem.weight.size(); ++i) {
    const DayValue& day = (*problem.days)[i];
    const double since = static_cast<double>(day.day) + 0.5 - fit.onset;
    const double g = rise(shapes.at(fit.shape), since) / fit.scale;
    const double left = (day.residual - fit.offset - fit.size * g) * std::sqrt(problem.weight[i]);
    product += i > 0 ? left * before : 0.0;
    square += left * left;
    before = left;
  }
  return square > 0.0 ? product / square : 0.0;
}

double inflation_by(double autocorrelation) {
  const double r = std::clamp(autocorrelation, 0.0, 0.8);
  return (1.0 + r) / (1.0 - r);
}

double quantile(const std::vector<double>& onsets, const std::vector<double>& cumulated,
                double share) {
  const auto at = std::lower_bound(cumulated.begin(), cumulated.end(), share * cumulated.back());
  const auto i = std::min(static_cast<std::size_t>(at - cumulated.begin()), onsets.size() - 1);
  return onsets[i];
}

// Joins the shapes: weights by onset, and the size in the mean over all. Every shape has the same
// onsets, in order.
OnsetEstimate estimate_from(const std::vector<Candidate>& all) {
  const double top = best_of(all).log_weight;
  const std::size_t grid = all.size() / shapes.size();
  std::vector<double> onsets(grid, 0.0);
  std::vector<double> weights(grid, 0.0);
  double sum = 0.0;
  double mean = 0.0;
  double square = 0.0;
  for (std::size_t i = 0; i < all.size(); ++i) {
    const Candidate& c = all[i];
    const double w = std::exp(c.log_weight - top);
    onsets[i % grid] = c.onset;
    weights[i % grid] += w;
    sum += w;
    mean += w * c.size;
    square += w * (c.size * c.size + c.size_u * c.size_u);
  }
  const auto peak = std::max_element(weights.begin(), weights.end()) - weights.begin();
  std::vector<double> cumulated = weights;
  for (std::size_t i = 1; i < cumulated.size(); ++i) {
    cumulated[i] += cumulated[i - 1];
  }
  mean /= sum;
  const double best = onsets[static_cast<std::size_t>(peak)];
  const double low = quantile(onsets, cumulated, 0.025) - onset_step;
  const double high = quantile(onsets, cumulated, 0.975) + onset_step;
  return {
      .best = best,
      .earliest = std::min(low, best),
      .latest = std::max(high, best),
      .size = {.value = mean, .u = std::sqrt(std::max(0.0, square / sum - mean * mean))}
  };
}

bool usable(const std::vector<DayValue>& days) {
  for (std::size_t i = 1; i < days.size(); ++i) {
    if (days[i].day <= days[i - 1].day) {
      return false;
    }
  }
  return std::all_of(days.begin(), days.end(), [](const DayValue& d) {
    return std::isfinite(d.residual) && d.u > 0.0 && std::isfinite(d.u);
  });
}

Problem problem_of(const std::vector<DayValue>& days, const OnsetPrior& prior) {
  Problem problem{.days = &days,
                  .weight = {},
                  .prior = prior,
                  .inflation = inflation_by(prior.autocorrelation),
                  .constant = {},
                  .rises = {}};
  for (const DayValue& day : days) {
    const double w = prior.scatter * prior.scatter / (day.u * day.u);
    problem.weight.push_back(w);
    problem.constant.w += w;
    problem.constant.r += w * day.residual;
    problem.constant.rr += w * day.residual * day.residual;
  }
  const std::int64_t most = half_days(days.back().day, 2 * days.front().day);
  for (const Shape& shape : shapes) {
    std::vector<double>& rises = problem.rises.emplace_back();
    for (std::int64_t since = 0; since <= most; ++since) {
      rises.push_back(rise(shape, onset_step * static_cast<double>(since)));
    }
  }
  return problem;
}

}  // namespace

Result<OnsetEstimate> estimate_onset(const std::vector<DayValue>& days, const OnsetPrior& prior) {
  if (!usable(days)) {
    return Refusal{
        Reason{.code = ReasonCode::implausible, .blame = "daily residual"}
    };
  }
  if (days.size() < 5) {
    return Refusal{
        Reason{.code = ReasonCode::load_too_small,
               .blame = "days with a residual",
               .value_SI = static_cast<double>(days.size())}
    };
  }
  Problem problem = problem_of(days, prior);
  std::vector<Candidate> all = candidates(problem);
  const double left = autocorrelation_left(problem, best_of(all));
  if (left > prior.autocorrelation) {
    problem.inflation = inflation_by(left);
    all = candidates(problem);
  }
  if (best_of(all).size <= 0.0) {
    return Refusal{
        Reason{.code = ReasonCode::contradicts, .blame = "daily residual"}
    };
  }
  return estimate_from(all);
}

}  // namespace lostwork
