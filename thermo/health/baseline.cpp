#include "thermo/health/baseline.h"

#include "thermo/health/least_squares.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <map>

namespace lostwork {
namespace {

constexpr std::size_t terms = 6;
using Row = std::array<double, terms>;

// Least margins of the range guard: a range of a hair's breadth is one set point [E].
constexpr double least_lift_margin = 1.0 / 290.0;  // about 1 K
constexpr double least_product_margin_K = 2.0;
// How much better, in leave-one-week-out scatter, coefficients of either sign have to be.
constexpr double plainly_better = 0.85;

double position(double value, const AxisRange& range) {
  const double half = 0.5 * (range.max - range.min);
  return half > 0.0 ? (value - range.min) / half - 1.0 : 0.0;
}

// Regressors of the surfaces: load and lift from -1 to 1 over the range seen.
Row surface_row(const Baseline& b, const Conditions& c) {
  const double q = position(c.heat_W, b.heat_W);
  const double l = position(c.lift, b.lift);
  return {1.0, q, l, q * q, q * l, l * l};
}

// Regressors of the power: T0 times the terms of S, load and lift in units of the largest seen.
Row entropy_row(const Baseline& b, const Conditions& c) {
  const double q = c.heat_W / b.heat_W.max;
  const double l = c.lift / b.lift.max;
  const double t = c.reference_T_K;
  return {t, t * l, t * q, t * q * l, t * q * q, t * q * q * l};
}

double dot(const Row& row, const std::vector<double>& x) {
  double sum = 0.0;
  for (std::size_t i = 0; i < terms; ++i) {
    sum += row.at(i) * x[i];
  }
  return sum;
}

double quadratic(const Row& row, const std::vector<double>& spread) {
  double sum = 0.0;
  for (std::size_t i = 0; i < terms; ++i) {
    double inner = 0.0;
    for (std::size_t j = 0; j < terms; ++j) {
      inner += spread[i * terms + j] * row.at(j);
    }
    sum += row.at(i) * inner;
  }
  return sum;
}

Row row_of(const Baseline& b, Feature feature, const Conditions& c) {
  return feature == Feature::power ? entropy_row(b, c) : surface_row(b, c);
}

void add_row(LinearSystem& system, const Baseline& b, Feature feature, const Sample& sample) {
  Row row = row_of(b, feature, sample.conditions);
  double target = *sample[feature];
  if (feature == Feature::power) {
    const double power = target;
    target = (power - sample.conditions.heat_W * sample.conditions.lift) / power;
    for (double& figure : row) {
      figure /= power;
    }
  }
  system.a.insert(system.a.end(), row.begin(), row.end());
  system.b.push_back(target);
}

using Samples = std::vector<const Sample*>;

Result<RobustFit> fit(const Baseline& b, Feature feature, const Samples& samples, Sign sign) {
  LinearSystem system{.columns = terms, .a = {}, .b = {}};
  for (const Sample* sample : samples) {
    add_row(system, b, feature, *sample);
  }
  return robust_fit(system, sign);
}

std::int64_t day_of(const Sample& sample) {
  return std::chrono::floor<std::chrono::days>(sample.end).time_since_epoch().count();
}

// Blocks that are left out in turn: weeks, or shorter where there are fewer than four.
std::vector<std::int64_t> blocks_of(const Samples& samples) {
  const std::int64_t first = day_of(*samples.front());
  const std::int64_t span = day_of(*samples.back()) - first + 1;
  const std::int64_t length = std::clamp<std::int64_t>(span / 4, 1, 7);
  std::vector<std::int64_t> blocks;
  blocks.reserve(samples.size());
  for (const Sample* sample : samples) {
    blocks.push_back((day_of(*sample) - first) / length);
  }
  return blocks;
}

Samples outside(const Samples& samples, const std::vector<std::int64_t>& blocks,
                std::int64_t block) {
  Samples out;
  for (std::size_t i = 0; i < samples.size(); ++i) {
    if (blocks[i] != block) {
      out.push_back(samples[i]);
    }
  }
  return out;
}

// Residuals, each against a fit that has not seen its block.
Result<std::vector<double>> left_out_residuals(Baseline b, Feature feature, const Samples& samples,
                                               Sign sign) {
  const std::vector<std::int64_t> blocks = blocks_of(samples);
  std::vector<double> residuals(samples.size(), 0.0);
  for (std::int64_t block = 0; block <= blocks.back(); ++block) {
    const Samples others = outside(samples, blocks, block);
    if (others.size() == samples.size()) {
      continue;
    }
    const auto found = fit(b, feature, others, sign);
    if (!found) {
      return Refusal{found.error()};
    }
    b.fits.at(static_cast<std::size_t>(feature)).x = found->x;
    for (std::size_t i = 0; i < samples.size(); ++i) {
      residuals[i] =
          blocks[i] == block ? residual(b, feature, *samples[i]).value_or(0.0) : residuals[i];
    }
  }
  return residuals;
}

double root_mean_square(const std::vector<double>& figures) {
  double sum = 0.0;
  for (const double figure : figures) {
    sum += figure * figure;
  }
  return figures.empty() ? 0.0 : std::sqrt(sum / static_cast<double>(figures.size()));
}

// As root mean square, with figures beyond three robust deviations counted as three.
double clipped_scatter(const std::vector<double>& figures) {
  std::vector<double> size;
  size.reserve(figures.size());
  for (const double figure : figures) {
    size.push_back(std::abs(figure));
  }
  const auto middle = size.begin() + static_cast<std::ptrdiff_t>(size.size() / 2);
  std::nth_element(size.begin(), middle, size.end());
  const double bound = 3.0 * 1.4826 * *middle;
  for (double& figure : size) {
    figure = std::min(figure, bound);
  }
  return root_mean_square(size);
}

// Of figures that follow each other in `places`, one apart.
double lag_one(const std::vector<std::int64_t>& places, const std::vector<double>& figures) {
  double product = 0.0;
  double square = 0.0;
  double pairs = 0.0;
  for (std::size_t i = 0; i < figures.size(); ++i) {
    square += figures[i] * figures[i];
    if (i > 0 && places[i] == places[i - 1] + 1) {
      product += figures[i] * figures[i - 1];
      pairs += 1.0;
    }
  }
  if (pairs < 3.0 || !(square > 0.0)) {
    return 0.0;
  }
  return product / pairs / (square / static_cast<double>(figures.size()));
}

struct Days {
  std::vector<std::int64_t> days;
  std::vector<double> means;
};

Days daily_means(const Samples& samples, const std::vector<double>& residuals) {
  Days out;
  double count = 0.0;
  for (std::size_t i = 0; i < samples.size(); ++i) {
    const std::int64_t day = day_of(*samples[i]);
    if (out.days.empty() || out.days.back() != day) {
      out.days.push_back(day);
      out.means.push_back(0.0);
      count = 0.0;
    }
    count += 1.0;
    out.means.back() += (residuals[i] - out.means.back()) / count;
  }
  return out;
}

// Share of the windows that carry news, by the autocorrelation of residuals in order.
double independent_share(const std::vector<double>& residuals) {
  std::vector<std::int64_t> order(residuals.size());
  for (std::size_t i = 0; i < order.size(); ++i) {
    order[i] = static_cast<std::int64_t>(i);
  }
  const double r = std::clamp(lag_one(order, residuals), 0.0, 0.95);
  return (1.0 - r) / (1.0 + r);
}

Result<FeatureFit> finished_fit(const Baseline& b, Feature feature, const Samples& samples,
                                Sign sign) {
  const auto whole = fit(b, feature, samples, sign);
  if (!whole) {
    return Refusal{whole.error()};
  }
  const auto left_out = left_out_residuals(b, feature, samples, sign);
  if (!left_out) {
    return Refusal{left_out.error()};
  }
  const Days days = daily_means(samples, *left_out);
  FeatureFit out{.x = whole->x, .spread = whole->spread};
  out.scatter = clipped_scatter(*left_out);
  out.day_sigma = clipped_scatter(days.means);
  out.day_autocorrelation = std::clamp(lag_one(days.days, days.means), 0.0, 0.8);
  const double fewer = 1.0 / independent_share(*left_out);
  for (double& figure : out.spread) {
    figure *= fewer;
  }
  return out;
}

Result<FeatureFit> power_fit(const Baseline& b, const Samples& samples) {
  auto positive = finished_fit(b, Feature::power, samples, Sign::not_negative);
  auto either = finished_fit(b, Feature::power, samples, Sign::any);
  if (!positive || (either && either->scatter < plainly_better * positive->scatter)) {
    return either;
  }
  return positive;
}

Samples with(const std::vector<Sample>& all, Feature feature) {
  Samples out;
  for (const Sample& sample : all) {
    if (sample[feature]) {
      out.push_back(&sample);
    }
  }
  return out;
}

AxisRange range_of(const std::vector<Sample>& samples, double Conditions::*axis) {
  AxisRange range{.min = samples.front().conditions.*axis, .max = samples.front().conditions.*axis};
  for (const Sample& sample : samples) {
    range.min = std::min(range.min, sample.conditions.*axis);
    range.max = std::max(range.max, sample.conditions.*axis);
  }
  return range;
}

// Leverage in the surface's regressors guards the corners that the ranges leave open.
void add_guard(Baseline& b, const Samples& samples) {
  const auto found = fit(b, Feature::hot_approach, samples, Sign::any);
  if (!found) {
    return;
  }
  b.guard_spread = found->spread;
  double largest = 3.0 * static_cast<double>(terms) / static_cast<double>(samples.size());
  for (const Sample* sample : samples) {
    largest = std::max(largest, quadratic(surface_row(b, sample->conditions), b.guard_spread));
  }
  b.leverage_limit = largest;
}

// The same samples with a figure of 0 in the place of a feature: only the regressors matter.
std::vector<Sample> without_values(const std::vector<Sample>& samples) {
  std::vector<Sample> out = samples;
  for (Sample& sample : out) {
    sample.features.at(static_cast<std::size_t>(Feature::hot_approach)) = 0.0;
  }
  return out;
}

bool within(double value, const AxisRange& range, double margin, double least) {
  const double out = std::max(margin * (range.max - range.min), least);
  return value >= range.min - out && value <= range.max + out;
}

}  // namespace

Result<Baseline> fit_baseline(Duty duty, const std::vector<Sample>& samples,
                              const BaselineOptions& options) {
  if (samples.size() < terms + 3) {
    return Refusal{
        Reason{.code = ReasonCode::load_too_small,
               .blame = "windows",
               .value_SI = static_cast<double>(samples.size())}
    };
  }
  Baseline b;
  b.duty = duty;
  b.margin = options.margin;
  b.heat_W = range_of(samples, &Conditions::heat_W);
  b.lift = range_of(samples, &Conditions::lift);
  b.product_T_K = range_of(samples, &Conditions::product_T_K);
  const Samples all = with(samples, Feature::power);
  auto power = power_fit(b, all);
  if (!power) {
    return Refusal{power.error()};
  }
  b.fits.at(0) = *power;
  const std::vector<Sample> regressors = without_values(samples);
  add_guard(b, with(regressors, Feature::hot_approach));
  for (std::size_t i = 1; i < feature_count; ++i) {
    const auto feature = static_cast<Feature>(i);
    const Samples have = with(samples, feature);
    if (have.size() * 5 < samples.size() * 4) {
      continue;  // mostly missing: nothing to compare with later
    }
    if (auto found = finished_fit(b, feature, have, Sign::any)) {
      b.fits.at(i) = *found;
    }
  }
  for (std::size_t i = 0; i < feature_count; ++i) {
    const double least = i == 0 ? options.min_sigma : info(static_cast<Feature>(i)).min_sigma;
    b.fits.at(i).day_sigma = std::max(b.fits.at(i).day_sigma, least);
  }
  const auto left_out = left_out_residuals(b, Feature::power, all, Sign::any);
  b.independent_windows =
      static_cast<double>(all.size()) * (left_out ? independent_share(*left_out) : 1.0);
  b.days =
      static_cast<std::uint32_t>(daily_means(all, std::vector<double>(all.size())).days.size());
  return b;
}

bool inside(const Baseline& b, const Conditions& c) {
  return within(c.heat_W, b.heat_W, b.margin, 0.0) &&
         within(c.lift, b.lift, b.margin, least_lift_margin) &&
         within(c.product_T_K, b.product_T_K, b.margin, least_product_margin_K) &&
         (b.guard_spread.empty() ||
          quadratic(surface_row(b, c), b.guard_spread) <= b.leverage_limit);
}

std::optional<double> expected(const Baseline& b, Feature feature, const Conditions& c) {
  const FeatureFit& fit = b[feature];
  if (fit.x.empty()) {
    return std::nullopt;
  }
  const double sum = dot(row_of(b, feature, c), fit.x);
  return feature == Feature::power ? c.heat_W * c.lift + sum : sum;
}

double prediction_u(const Baseline& b, Feature feature, const Conditions& c) {
  const FeatureFit& fit = b[feature];
  Row row = row_of(b, feature, c);
  if (feature == Feature::power) {
    const double power = expected(b, feature, c).value_or(1.0);
    for (double& figure : row) {
      figure /= power;
    }
  }
  return fit.scatter * std::sqrt(1.0 + std::max(0.0, quadratic(row, fit.spread)));
}

double coverage_factor(const Baseline& b) {
  // Student's t, 0.975, expanded about the normal (Abramowitz & Stegun 26.7.5).
  constexpr double z = 1.959963984540054;
  const double n = std::max(b.independent_windows - static_cast<double>(terms), 3.0);
  const double z3 = z * z * z;
  const double z5 = z3 * z * z;
  return z + (z3 + z) / (4.0 * n) + (5.0 * z5 + 16.0 * z3 + 3.0 * z) / (96.0 * n * n);
}

std::optional<double> residual(const Baseline& b, Feature feature, const Sample& sample) {
  const auto should = expected(b, feature, sample.conditions);
  if (!should || !sample[feature]) {
    return std::nullopt;
  }
  const FeatureInfo& how = info(feature);
  const double difference = *sample[feature] - *should;
  if (how.relative) {
    return *should > 0.0 ? std::optional{difference / *should} : std::nullopt;
  }
  if (how.of_power) {
    const auto power = expected(b, Feature::power, sample.conditions);
    return power && *power > 0.0 ? std::optional{difference / *power} : std::nullopt;
  }
  return difference;
}

}  // namespace lostwork
