// Linear least squares: robust against outliers, and with coefficients that may not be negative.
//
// Pure. Dense, small: tens of columns, hundreds of rows.
// Source: Lawson & Hanson, Solving Least Squares Problems (1974), ch. 23, algorithm NNLS; Huber,
// Robust Statistics (1981), weights with k = 1.345 and the scale from the median of |residual|.
#pragma once

#include "thermo/result.h"

#include <cstddef>
#include <vector>

namespace lostwork {

// rows = b.size(); a is row by row, rows * columns figures. Rows are weighted before.
struct LinearSystem {
  std::size_t columns = 0;
  std::vector<double> a;
  std::vector<double> b;
};

enum class Sign : bool { any, not_negative };

// min |a x - b|. Columns that say nothing new get a coefficient of 0.
// Refuses: implausible (a figure not finite, sizes that do not fit, no rows), not_converged.
[[nodiscard]] Result<std::vector<double>> least_squares(const LinearSystem& system, Sign sign);

struct RobustFit {
  std::vector<double> x;
  std::vector<double> weights;  // of the rows, 0..1
  std::vector<double> spread;   // (A' W A)^-1 of all columns, columns * columns; symmetric
  double scatter = 0.0;         // standard deviation of the residuals, degrees of freedom counted
};

// Three passes of Huber's weights.
// Refuses: as least_squares; load_too_small where there are fewer rows than columns + 3.
[[nodiscard]] Result<RobustFit> robust_fit(const LinearSystem& system, Sign sign);

// x' spread x: a row's leverage, and the share of scatter^2 that the fit's own uncertainty adds.
[[nodiscard]] double leverage(const std::vector<double>& row, const std::vector<double>& spread);

}  // namespace lostwork
