// What a machine needed, and how its features stood, when it was well: as functions of the
// conditions.
//
// Pure. The power in the entropy form (methods.md 4.1):
//   S = b0 + b1 L + b2 Q + b3 Q L + b4 Q^2 + b5 Q^2 L,   W = Q L + T0 S,   b >= 0,
// fitted to relative errors; where leave-one-week-out says that coefficients of either sign predict
// plainly better, those. Every other feature as a quadratic surface over load and lift. Robust fits
// (least_squares.h). Scatter and day-to-day scatter come from leave-one-week-out, so that what the
// form cannot follow is in them.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/health/features.h"
#include "thermo/measured.h"
#include "thermo/result.h"

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace lostwork {

struct FeatureFit {
  std::vector<double> x;       // empty: the feature was not there
  std::vector<double> spread;  // its uncertainty in units of scatter^2, autocorrelation counted
  double scatter = 0.0;        // of one window, residual's unit
  double day_sigma = 0.0;      // of a day's mean, residual's unit; at least FeatureInfo::min_sigma
  double day_autocorrelation = 0.0;  // 0..0.8
};

struct AxisRange {
  double min = 0.0;
  double max = 0.0;
};

struct Baseline {
  std::string id;
  Duty duty{};
  AxisRange heat_W;
  AxisRange lift;
  AxisRange product_T_K;
  double margin = 0.1;
  std::vector<double> guard_spread;  // (X'X)^-1 of the surface's regressors
  double leverage_limit = 0.0;
  std::array<FeatureFit, feature_count> fits;
  double independent_windows = 0.0;
  std::uint32_t days = 0;
  bool narrow = false;
  double chart_limit = 0.0;            // h of every chart
  double chart_autocorrelation = 0.0;  // that it was simulated for

  [[nodiscard]] const FeatureFit& operator[](Feature f) const {
    return fits.at(static_cast<std::size_t>(f));
  }
};

struct BaselineOptions {
  double margin = 0.1;
  double min_sigma = 0.01;  // of the power's days
};

// Samples in order of time. Refuses: load_too_small with too few of them, not_converged,
// implausible. Leaves id, narrow and the chart's limit to the caller.
[[nodiscard]] Result<Baseline> fit_baseline(Duty duty, const std::vector<Sample>& samples,
                                            const BaselineOptions& options);

// Inside the range seen, with its margin, and near enough to the points seen.
[[nodiscard]] bool inside(const Baseline& baseline, const Conditions& conditions);

// What the feature should be; nothing where it was not there. Not guarded.
[[nodiscard]] std::optional<double> expected(const Baseline& baseline, Feature feature,
                                             const Conditions& conditions);
// Standard uncertainty of one window's residual against it: scatter and the fit's own.
[[nodiscard]] double prediction_u(const Baseline& baseline, Feature feature,
                                  const Conditions& conditions);
// Student's factor for 95 % with the baseline's degrees of freedom.
[[nodiscard]] double coverage_factor(const Baseline& baseline);

// By FeatureInfo: value against expectation, ratio or difference.
[[nodiscard]] std::optional<double> residual(const Baseline& baseline, Feature feature,
                                             const Sample& sample);

template <class Archive>
void archive(Archive& a, FeatureFit& f) {
  a(f.x, f.spread, f.scatter, f.day_sigma, f.day_autocorrelation);
}
template <class Archive>
void archive(Archive& a, AxisRange& r) {
  a(r.min, r.max);
}
template <class Archive>
void archive(Archive& a, Baseline& b) {
  a(b.id, b.duty, b.heat_W, b.lift, b.product_T_K, b.margin, b.guard_spread, b.leverage_limit,
    b.fits, b.independent_windows, b.days, b.narrow, b.chart_limit, b.chart_autocorrelation);
}

}  // namespace lostwork
