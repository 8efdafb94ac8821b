#include "tests/thermo/health/played.h"

#include <algorithm>
#include <utility>

namespace lostwork::testing {
namespace {

void take_up(Played& played, HealthUpdate&& update) {
  played.state = std::move(update.next);
  played.changed.insert(played.changed.end(), update.changed.begin(), update.changed.end());
  played.days.insert(played.days.end(), update.days_closed.begin(), update.days_closed.end());
}

}  // namespace

std::optional<Finding> Played::last(FindingKind kind) const {
  const auto found = std::find_if(changed.rbegin(), changed.rend(),
                                  [kind](const Finding& f) { return f.kind == kind; });
  return found == changed.rend() ? std::nullopt : std::optional{*found};
}

std::optional<Finding> Played::confirmed(FindingKind kind) const {
  const auto found = std::find_if(changed.begin(), changed.end(), [kind](const Finding& f) {
    return f.kind == kind && f.state == FindingState::active;
  });
  return found == changed.end() ? std::nullopt : std::optional{*found};
}

HealthModel health_model() {
  HealthModel model;
  model.machine = synthetic_model();
  model.tariff.price_per_J = 0.20 / 3.6e6;
  return model;
}

void play(const HealthModel& model, Played& played, const std::vector<Window>& windows) {
  for (const Window& window : windows) {
    take_up(played, take_window(model, std::move(played.state), window));
    take_up(played, advance_time(model, std::move(played.state), window.end));
  }
}

Played played(const std::vector<Window>& windows) {
  Played out;
  play(health_model(), out, windows);
  return out;
}

}  // namespace lostwork::testing
