#include "thermo/measure/window_of.h"

namespace lostwork {
namespace {

constexpr double least_share = 0.8;

std::optional<WindowMean>& at(Window& window, Quantity q) {
  return window.values.at(static_cast<std::size_t>(q));
}

// over / under + plus; none where a part is missing.
struct Ratio {
  Quantity ratio;
  Quantity over;
  Quantity under;
  double plus;
};

void make(Window& window, const Ratio& r) {
  auto& ratio = at(window, r.ratio);
  const auto& over = window[r.over];
  const auto& under = window[r.under];
  if (!ratio || !over || !under || !(under->mean_SI > 0.0)) {
    ratio.reset();
    return;
  }
  ratio->mean_SI = over->mean_SI / under->mean_SI + r.plus;
}

}  // namespace

Window window_of(const WindowSums& sums, Duty duty) {
  Window out{.begin = sums.begin, .end = sums.end, .scans = sums.scans};
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto s = scatter(sums.quantities.at(i));
    if (s && sums.quantities.at(i).n >= least_share * sums.scans) {
      out.values.at(i) = WindowMean{
          .mean_SI = s->mean, .u_SI = s->u, .sd_SI = s->sd, .n_effective = s->n_effective};
    }
  }
  const Quantity useful = duty == Duty::cooling ? Quantity::cold_heat : Quantity::hot_heat;
  make(out, {Quantity::cop, useful, Quantity::power, 0.0});
  make(out, {Quantity::cop_reversible, useful, Quantity::reversible_power, 0.0});
  make(out, {Quantity::second_law_efficiency, Quantity::reversible_power, Quantity::power, 0.0});
  make(out, {Quantity::power_residual, Quantity::power, Quantity::power_expected, -1.0});
  return out;
}

}  // namespace lostwork
