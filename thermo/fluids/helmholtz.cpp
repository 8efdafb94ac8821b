#include "thermo/fluids/helmholtz.h"

#include <cmath>

namespace lostwork {
namespace {

// A factor below exp(-100) = 4e-44 is nothing beside any sum of terms in double precision.
constexpr double nothing = -100.0;

constexpr std::size_t most_powers = 32;  // of delta; the tables go to delta^15

double power(double base_log, double exponent) {
  return std::exp(exponent * base_log);
}

// Adds one term f(delta) g(tau) by the logarithmic derivatives of its two factors.
struct Factor {
  double value;   // the factor itself
  double first;   // x f' / f
  double second;  // x^2 f'' / f
};
template <bool with_tau>
void add_product(double n, const Factor& by_delta, const Factor& by_tau, Reduced& sum) {
  const double value = n * by_delta.value * by_tau.value;
  sum.a += value;
  sum.d += value * by_delta.first;
  sum.dd += value * by_delta.second;
  if constexpr (with_tau) {
    sum.t += value * by_tau.first;
    sum.dt += value * by_delta.first * by_tau.first;
    sum.tt += value * by_tau.second;
  }
}

// x^k exp(-width (x - centre)^2)
Factor bell(double x, double x_power, double k, double width, double centre) {
  const double distance = x - centre;
  const double first = k - 2.0 * width * x * distance;
  return {x_power * std::exp(-width * distance * distance), first,
          first * first - k - 2.0 * width * x * x};
}

// x^t exp(1 / (beta (x - gamma)^2 + b))
Factor association(double x, double x_power, const AssociatingTerm& term) {
  const double distance = x - term.gamma;
  const double g = 1.0 / (term.beta * distance * distance + term.b);
  const double g_x = -2.0 * term.beta * distance * g * g;
  const double g_xx = 2.0 * term.beta * g * g * (4.0 * term.beta * distance * distance * g - 1.0);
  const double first = term.t + x * g_x;
  return {x_power * std::exp(g), first, first * first - term.t + x * x * g_xx};
}

// D = theta^2 + B q^a with q = (delta - 1)^2 and its derivatives; none divides by delta - 1.
struct Distance {
  double value, d, dd, t, dt, tt;
};
Distance distance(const NonAnalyticTerm& term, double tau, double delta) {
  const double off = delta - 1.0;
  const double q = off * off;
  const double exponent = 0.5 / term.beta;
  const double q_power = std::pow(q, exponent - 1.0);
  const double q_power_a = std::pow(q, term.a - 1.0);
  const double theta = (1.0 - tau) + term.upper_a * q_power * q;
  const double theta_q = term.upper_a * exponent * q_power;
  const double theta_d = 2.0 * off * theta_q;
  const double theta_dd = 2.0 * theta_q * (2.0 * exponent - 1.0);
  const double b_q = term.upper_b * term.a * q_power_a;
  return {.value = theta * theta + term.upper_b * q_power_a * q,
          .d = 2.0 * theta * theta_d + 2.0 * off * b_q,
          .dd = 2.0 * theta_d * theta_d + 2.0 * theta * theta_dd + 2.0 * b_q * (2.0 * term.a - 1.0),
          .t = -2.0 * theta,
          .dt = -2.0 * theta_d,
          .tt = 2.0};
}

}  // namespace

Isotherm::Isotherm(const Fluid& fluid, double T_K)
    : fluid_{&fluid}, T_K_{T_K}, tau_{fluid.reducing_T_K / T_K}, log_tau_{std::log(tau_)} {
  set_ideal_part();
  set_groups();
}

void Isotherm::set_ideal_part() {
  const IdealPart& part = fluid_->ideal;
  ideal_ = part.a1 + part.a2 * tau_ + part.a_log_tau * log_tau_;
  ideal_t_ = part.a2 * tau_ + part.a_log_tau;
  ideal_tt_ = -part.a_log_tau;
  for (const Power& row : part.powers) {
    const double value = row.n * power(log_tau_, row.t);
    ideal_ += value;
    ideal_t_ += row.t * value;
    ideal_tt_ += row.t * (row.t - 1.0) * value;
  }
  for (const PlanckEinstein& row : part.planck_einstein) {
    const double x = row.theta * tau_;
    const double decay = std::exp(-x);
    const double occupied = decay / (1.0 - decay);
    ideal_ += row.n * std::log1p(-decay);
    ideal_t_ += row.n * x * occupied;
    ideal_tt_ -= row.n * x * x * occupied * (1.0 + occupied);
  }
}

// n tau^t is given. Where exp(-tau^m) comes to it, the logarithmic derivative is t - m tau^m.
void Isotherm::add_row(const PowerTerms::Row& row, double value, Coefficient& sum) const {
  if (row.m == 0.0) {
    sum.c += value;
    sum.ct += value * row.t;
    sum.ctt += value * row.t * (row.t - 1.0);
    return;
  }
  const double tau_m = power(log_tau_, row.m);
  const double decayed = value * std::exp(-tau_m);
  const double first = row.t - row.m * tau_m;
  sum.c += decayed;
  sum.ct += decayed * first;
  sum.ctt += decayed * (first * (first - 1.0) - row.m * row.m * tau_m);
}

void Isotherm::set_groups() {
  const PowerTerms& terms = fluid_->residual;
  std::array<double, PowerTerms::capacity> powers;  // NOLINT(*-init-variables): filled below
  powers[0] = 1.0;
  std::size_t count = 0;
  for (const PowerTerms::TauPower& row : terms.powers()) {
    powers[count] = row.by_exp
                        ? power(log_tau_, row.t)
                        : powers[row.factors[0]] * powers[row.factors[1]] * powers[row.factors[2]];
    ++count;
  }
  count = 0;
  for (const PowerTerms::Group& group : terms.groups()) {
    Coefficient sum{0.0, 0.0, 0.0};
    for (std::size_t i = group.begin; i < group.end; ++i) {
      const PowerTerms::Row& row = terms.rows()[i];
      add_row(row, row.n * powers[row.power], sum);
    }
    groups_[count++] = sum;
  }
}

// The sums over the groups of one decay, without its exponential.
template <bool with_tau>
Reduced Isotherm::before_decay(const PowerTerms::Decay& decay,
                               std::span<const double> delta_powers) const {
  Reduced part{};
  for (std::size_t i = decay.begin; i < decay.end; ++i) {
    const PowerTerms::Group& group = fluid_->residual.groups()[i];
    const Coefficient& of = groups_[i];
    const double delta_power = delta_powers[group.delta_power];
    const double value = of.c * delta_power;
    part.a += value;
    part.d += value * group.d;
    part.dd += value * group.d * (group.d - 1.0);
    if constexpr (with_tau) {
      part.t += of.ct * delta_power;
      part.dt += of.ct * delta_power * group.d;
      part.tt += of.ctt * delta_power;
    }
  }
  return part;
}

// With u = l delta^l and the sums over a group of equal l, x^k the k-th falling power of d:
// d of c delta^d exp(-delta^l) is (d - u), dd is d (d - 1) - 2 d u + u + u^2 - l u.
template <bool with_tau>
void Isotherm::add_powers(double delta, Reduced& sum) const {
  const PowerTerms& terms = fluid_->residual;
  std::array<double, most_powers> powers;  // NOLINT(*-init-variables): filled below
  powers[0] = 1.0;
  powers[1] = delta;
  for (std::size_t k = 2; k <= terms.highest(); ++k) {
    powers[k] = powers[k / 2] * powers[k - k / 2];
  }
  for (const PowerTerms::Decay& decay : terms.decays()) {
    const Reduced part = before_decay<with_tau>(decay, powers);
    const double l = decay.l;
    const double u = l * powers[decay.delta_power];
    const double factor = l > 0.0 ? std::exp(-powers[decay.delta_power]) : 1.0;
    sum.a += factor * part.a;
    sum.d += factor * (part.d - u * part.a);
    sum.dd += factor * (part.dd - 2.0 * u * part.d + (u + u * u - l * u) * part.a);
    if constexpr (with_tau) {
      sum.t += factor * part.t;
      sum.dt += factor * (part.dt - u * part.t);
      sum.tt += factor * part.tt;
    }
  }
}

template <bool with_tau>
void Isotherm::add_gaussians(double delta, Reduced& sum) const {
  for (const GaussianTerm& term : fluid_->gaussian) {
    const double off_delta = delta - term.epsilon;
    const double off_tau = tau_ - term.gamma;
    if (-term.eta * off_delta * off_delta - term.beta * off_tau * off_tau < nothing) {
      continue;
    }
    const Factor by_delta = bell(delta, std::pow(delta, term.d), term.d, term.eta, term.epsilon);
    const Factor by_tau = bell(tau_, power(log_tau_, term.t), term.t, term.beta, term.gamma);
    add_product<with_tau>(term.n, by_delta, by_tau, sum);
  }
}

template <bool with_tau>
void Isotherm::add_associating(double delta, Reduced& sum) const {
  for (const AssociatingTerm& term : fluid_->associating) {
    const double off_delta = delta - term.epsilon;
    if (term.eta * off_delta * off_delta < nothing) {
      continue;
    }
    const Factor by_delta = bell(delta, std::pow(delta, term.d), term.d, -term.eta, term.epsilon);
    const Factor by_tau = association(tau_, power(log_tau_, term.t), term);
    add_product<with_tau>(term.n, by_delta, by_tau, sum);
  }
}

template <bool with_tau>
void Isotherm::add_non_analytic(double delta, Reduced& sum) const {
  for (const NonAnalyticTerm& term : fluid_->non_analytic) {
    const double off_delta = delta - 1.0;
    const double off_tau = tau_ - 1.0;
    const double exponent =
        -term.upper_c * off_delta * off_delta - term.upper_d * off_tau * off_tau;
    if (exponent < nothing) {
      continue;
    }
    // The logarithm of the term is b ln(D) + ln(delta) + exponent.
    const Distance far = distance(term, tau_, delta);
    const double value = term.n * std::pow(far.value, term.b) * delta * std::exp(exponent);
    const double b = term.b / far.value;
    const double log_d = b * far.d + 1.0 / delta - 2.0 * term.upper_c * off_delta;
    const double log_dd =
        b * (far.dd - far.d * far.d / far.value) - 1.0 / (delta * delta) - 2.0 * term.upper_c;
    sum.a += value;
    sum.d += value * delta * log_d;
    sum.dd += value * delta * delta * (log_dd + log_d * log_d);
    if constexpr (with_tau) {
      const double log_t = b * far.t - 2.0 * term.upper_d * off_tau;
      const double log_dt = b * (far.dt - far.d * far.t / far.value);
      const double log_tt = b * (far.tt - far.t * far.t / far.value) - 2.0 * term.upper_d;
      sum.t += value * tau_ * log_t;
      sum.dt += value * delta * tau_ * (log_dt + log_d * log_t);
      sum.tt += value * tau_ * tau_ * (log_tt + log_t * log_t);
    }
  }
}

Reduced Isotherm::residual(double delta) const {
  Reduced sum{};
  add_powers<true>(delta, sum);
  add_gaussians<true>(delta, sum);
  add_associating<true>(delta, sum);
  add_non_analytic<true>(delta, sum);
  return sum;
}

double Isotherm::second_virial() const {
  // The terms linear in delta at delta = 0; gaussian and non-analytic ones are left to the search
  // that this only starts.
  double sum = 0.0;
  const std::span<const PowerTerms::Group> groups = fluid_->residual.groups();
  for (std::size_t i = 0; i < groups.size(); ++i) {
    sum += groups[i].delta_power == 1 ? groups_[i].c : 0.0;
  }
  return sum / fluid_->reducing_rho_kgm3;
}

Slope Isotherm::slope(double rho_kgm3) const {
  const double delta = rho_kgm3 / fluid_->reducing_rho_kgm3;
  Reduced sum{};
  add_powers<false>(delta, sum);
  add_gaussians<false>(delta, sum);
  add_associating<false>(delta, sum);
  add_non_analytic<false>(delta, sum);
  const double rt_Jkg = fluid_->gas_constant_JkgK * T_K_;
  return {rho_kgm3 * rt_Jkg * (1.0 + sum.d), rt_Jkg * (1.0 + 2.0 * sum.d + sum.dd), sum.a};
}

Properties Isotherm::properties(double rho_kgm3) const {
  const double delta = rho_kgm3 / fluid_->reducing_rho_kgm3;
  const Reduced r = residual(delta);
  const double gas = fluid_->gas_constant_JkgK;
  const double energy = ideal_t_ + r.t;            // u / (R T)
  const double compressibility = 1.0 + r.d;        // p / (rho R T)
  const double by_rho = 1.0 + 2.0 * r.d + r.dd;    // (dp/drho) / (R T)
  const double by_temperature = 1.0 + r.d - r.dt;  // (dp/dT) / (rho R)
  const double cv = -(ideal_tt_ + r.tt);           // cv / R
  const double cp = cv + by_temperature * by_temperature / by_rho;
  return {.p_Pa = rho_kgm3 * gas * T_K_ * compressibility,
          .h_Jkg = gas * T_K_ * (energy + compressibility),
          .s_JkgK = gas * (energy - ideal_ - std::log(delta) - r.a),
          .cv_JkgK = gas * cv,
          .cp_JkgK = gas * cp,
          .sound_speed_w = std::sqrt(gas * T_K_ * by_rho * cp / cv),
          .p_by_rho = gas * T_K_ * by_rho,
          .p_by_T = rho_kgm3 * gas * by_temperature};
}

}  // namespace lostwork
