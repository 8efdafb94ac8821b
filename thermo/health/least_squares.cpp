#include "thermo/health/least_squares.h"

#include <algorithm>
#include <cmath>
#include <utility>

#include <Eigen/Dense>

namespace lostwork {
namespace {

using Matrix = Eigen::MatrixXd;
using Vector = Eigen::VectorXd;
using Rows = Eigen::Matrix<double, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;

// Columns below this share of the largest diagonal of R say nothing new.
constexpr double rank_threshold = 1e-10;
// Of each column's own square sum: keeps the inverse finite where a column says nothing new, and
// makes the leverage of a point in an unseen direction huge.
constexpr double ridge = 1e-9;

bool all_finite(const std::vector<double>& figures) {
  return std::all_of(figures.begin(), figures.end(), [](double f) { return std::isfinite(f); });
}

bool usable(const LinearSystem& system) {
  return system.columns > 0 && !system.b.empty() &&
         system.a.size() == system.columns * system.b.size() && all_finite(system.a) &&
         all_finite(system.b);
}

Matrix matrix_of(const LinearSystem& system) {
  return Eigen::Map<const Rows>(system.a.data(), static_cast<Eigen::Index>(system.b.size()),
                                static_cast<Eigen::Index>(system.columns));
}

Vector vector_of(const LinearSystem& system) {
  return Eigen::Map<const Vector>(system.b.data(), static_cast<Eigen::Index>(system.b.size()));
}

// Each column divided by its length, so that thresholds mean the same for all of them.
struct Scaled {
  Matrix a;
  Vector length;
};

Scaled scaled(Matrix a) {
  Vector length = a.colwise().norm().transpose();
  for (Eigen::Index j = 0; j < a.cols(); ++j) {
    if (length(j) > 0.0) {
      a.col(j) /= length(j);
    } else {
      length(j) = 1.0;
    }
  }
  return {.a = std::move(a), .length = std::move(length)};
}

Vector solve_any(const Matrix& a, const Vector& b) {
  Eigen::ColPivHouseholderQR<Matrix> qr(a.rows(), a.cols());
  qr.setThreshold(rank_threshold);
  qr.compute(a);
  return qr.solve(b);
}

// The passive columns' own least squares; 0 for the others.
Vector solve_passive(const Matrix& a, const Vector& b, const std::vector<bool>& passive) {
  std::vector<Eigen::Index> chosen;
  for (std::size_t j = 0; j < passive.size(); ++j) {
    if (passive[j]) {
      chosen.push_back(static_cast<Eigen::Index>(j));
    }
  }
  Matrix part(a.rows(), static_cast<Eigen::Index>(chosen.size()));
  for (std::size_t j = 0; j < chosen.size(); ++j) {
    part.col(static_cast<Eigen::Index>(j)) = a.col(chosen[j]);
  }
  const Vector found = solve_any(part, b);
  Vector x = Vector::Zero(a.cols());
  for (std::size_t j = 0; j < chosen.size(); ++j) {
    x(chosen[j]) = found(static_cast<Eigen::Index>(j));
  }
  return x;
}

// Goes from x towards z until the first passive coefficient meets 0, and lets that one go.
void step_back(Vector& x, const Vector& z, std::vector<bool>& passive) {
  double share = 1.0;
  for (std::size_t j = 0; j < passive.size(); ++j) {
    const auto i = static_cast<Eigen::Index>(j);
    if (passive[j] && z(i) <= 0.0) {
      share = std::min(share, x(i) / (x(i) - z(i)));
    }
  }
  x += share * (z - x);
  for (std::size_t j = 0; j < passive.size(); ++j) {
    const auto i = static_cast<Eigen::Index>(j);
    if (passive[j] && (x(i) <= 1e-14 || (z(i) <= 0.0 && x(i) < 1e-12 * x.cwiseAbs().maxCoeff()))) {
      passive[j] = false;
      x(i) = 0.0;
    }
  }
}

bool passive_all_positive(const Vector& z, const std::vector<bool>& passive) {
  for (std::size_t j = 0; j < passive.size(); ++j) {
    if (passive[j] && z(static_cast<Eigen::Index>(j)) <= 0.0) {
      return false;
    }
  }
  return true;
}

// The column outside the passive set along which the error falls fastest; none: solved.
Eigen::Index steepest(const Vector& descent, const std::vector<bool>& passive, double tolerance) {
  Eigen::Index best = -1;
  for (std::size_t j = 0; j < passive.size(); ++j) {
    const auto i = static_cast<Eigen::Index>(j);
    if (!passive[j] && descent(i) > tolerance && (best < 0 || descent(i) > descent(best))) {
      best = i;
    }
  }
  return best;
}

Result<Vector> solve_not_negative(const Matrix& a, const Vector& b) {
  const double tolerance = 1e-12 * (1.0 + b.norm());
  Vector x = Vector::Zero(a.cols());
  std::vector<bool> passive(static_cast<std::size_t>(a.cols()), false);
  const auto limit = 30 * (a.cols() + 1);
  for (Eigen::Index pass = 0; pass < limit; ++pass) {
    const Vector descent = a.transpose() * (b - a * x);
    const Eigen::Index entering = steepest(descent, passive, tolerance);
    if (entering < 0) {
      return x;
    }
    passive[static_cast<std::size_t>(entering)] = true;
    Vector z = solve_passive(a, b, passive);
    if (z(entering) <= 0.0) {  // rounding alone let it in
      return x;
    }
    for (Eigen::Index inner = 0; inner < limit && !passive_all_positive(z, passive); ++inner) {
      step_back(x, z, passive);
      z = solve_passive(a, b, passive);
    }
    x = z;
  }
  return Refusal{
      Reason{.code = ReasonCode::not_converged, .blame = "non-negative fit"}
  };
}

Result<Vector> solve(const Matrix& a, const Vector& b, Sign sign) {
  const Scaled s = scaled(a);
  Result<Vector> y =
      sign == Sign::any ? Result<Vector>{solve_any(s.a, b)} : solve_not_negative(s.a, b);
  if (!y) {
    return y;
  }
  return Vector{y->cwiseQuotient(s.length)};
}

double median(std::vector<double> figures) {
  const auto middle = figures.begin() + static_cast<std::ptrdiff_t>(figures.size() / 2);
  std::nth_element(figures.begin(), middle, figures.end());
  return *middle;
}

// Huber's weights for residuals; the scale is 1.4826 median |r|, right for normal errors.
Vector huber_weights(const Vector& residual) {
  std::vector<double> size(static_cast<std::size_t>(residual.size()));
  for (std::size_t i = 0; i < size.size(); ++i) {
    size[i] = std::abs(residual(static_cast<Eigen::Index>(i)));
  }
  const double bound = 1.345 * 1.4826 * median(size);
  Vector weight = Vector::Ones(residual.size());
  for (Eigen::Index i = 0; i < residual.size(); ++i) {
    const double r = std::abs(residual(i));
    if (r > bound && bound > 0.0) {
      weight(i) = bound / r;
    }
  }
  return weight;
}

Matrix spread_of(const Matrix& a, const Vector& weight) {
  const Scaled s = scaled(a);
  Matrix normal = s.a.transpose() * weight.asDiagonal() * s.a;
  normal.diagonal().array() += ridge;
  const Matrix inverse = normal.ldlt().solve(Matrix::Identity(a.cols(), a.cols()));
  const Vector unscale = s.length.cwiseInverse();
  return unscale.asDiagonal() * inverse * unscale.asDiagonal();
}

std::vector<double> figures(const Vector& v) {
  return {v.data(), v.data() + v.size()};
}

Refusal unusable() {
  return Refusal{
      Reason{.code = ReasonCode::implausible, .blame = "least squares"}
  };
}

}  // namespace

Result<std::vector<double>> least_squares(const LinearSystem& system, Sign sign) {
  if (!usable(system)) {
    return unusable();
  }
  return solve(matrix_of(system), vector_of(system), sign).map(figures);
}

Result<RobustFit> robust_fit(const LinearSystem& system, Sign sign) {
  if (!usable(system)) {
    return unusable();
  }
  if (system.b.size() < system.columns + 3) {
    return Refusal{
        Reason{.code = ReasonCode::load_too_small, .blame = "rows to fit"}
    };
  }
  const Matrix a = matrix_of(system);
  const Vector b = vector_of(system);
  Vector weight = Vector::Ones(a.rows());
  Result<Vector> x = solve(a, b, sign);
  for (int pass = 0; pass < 3 && x; ++pass) {
    weight = huber_weights(a * *x - b);
    const Vector root = weight.cwiseSqrt();
    x = solve(root.asDiagonal() * a, root.cwiseProduct(b), sign);
  }
  if (!x) {
    return Refusal{x.error()};
  }
  const Vector residual = a * *x - b;
  const Vector root = weight.cwiseSqrt();
  const double freedom = weight.sum() - static_cast<double>(a.cols());
  const Matrix spread = spread_of(a, weight);
  return RobustFit{
      .x = figures(*x),
      .weights = figures(weight),
      .spread = std::vector<double>(spread.data(), spread.data() + spread.size()),
      .scatter = root.cwiseProduct(residual).norm() / std::sqrt(std::max(freedom, 1.0))};
}

double leverage(const std::vector<double>& row, const std::vector<double>& spread) {
  double sum = 0.0;
  for (std::size_t i = 0; i < row.size(); ++i) {
    double inner = 0.0;
    for (std::size_t j = 0; j < row.size(); ++j) {
      inner += spread[i * row.size() + j] * row[j];
    }
    sum += row[i] * inner;
  }
  return sum;
}

}  // namespace lostwork
