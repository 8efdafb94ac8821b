#include "thermo/measure/operation.h"

#include <algorithm>

namespace lostwork {
namespace {

enum class Evidence : std::uint8_t { none, off, between, on };

std::optional<double> good(const MachineModel& model, const Scan& scan, Role role) {
  const auto index = model.index_of(role);
  if (!index || *index >= scan.readings.size() || scan.readings[*index].quality != Quality::good) {
    return std::nullopt;
  }
  return scan.readings[*index].value_SI;
}

Evidence by_power(const OperationOptions& options, double share) {
  if (!(share >= -options.off_below)) {
    return Evidence::none;
  }
  if (share >= options.on_above) {
    return Evidence::on;
  }
  return share < options.off_below ? Evidence::off : Evidence::between;
}

Evidence evidence(const OperationOptions& options, const MachineModel& model, const Scan& scan) {
  const auto power_W = good(model, scan, Role::power);
  const auto power = power_W ? by_power(options, *power_W / model.rated_power_W) : Evidence::none;
  if (power == Evidence::on || power == Evidence::off) {
    return power;
  }
  const auto speed_Hz = good(model, scan, Role::speed);
  if (!speed_Hz) {
    return power;
  }
  return *speed_Hz >= options.turning_Hz ? Evidence::on : Evidence::off;
}

void start(OperationState& s, Instant now) {
  s.on = true;
  s.start_seen = true;
  s.on_since = now;
  s.low_since.reset();
  s.starts.at(s.starts_seen % OperationState::remembered) = now;
  ++s.starts_seen;
}

void see_for_the_first_time(OperationState& s, bool on, Instant now) {
  s.on = on;
  s.start_seen = false;
  s.on_since = now;
  s.low_since.reset();
}

Mode mode_while_on(const OperationOptions& options, const OperationState& s, bool defrosting,
                   Instant now) {
  if (s.low_since) {
    return Mode::stopping;
  }
  if (defrosting) {
    return Mode::defrost;
  }
  if (starts_within_hour(s, now) > options.cycling_starts) {
    return Mode::cycling;
  }
  return s.start_seen && now - s.on_since < options.settling ? Mode::starting : Mode::running;
}

void follow(const OperationOptions& options, OperationState& s, Evidence seen, Instant now) {
  if (s.mode == Mode::unknown) {
    if (seen != Evidence::between) {
      see_for_the_first_time(s, seen == Evidence::on, now);
    }
    return;
  }
  if (!s.on) {
    if (seen == Evidence::on) {
      start(s, now);
    }
    return;
  }
  if (seen != Evidence::off) {
    s.low_since.reset();
    return;
  }
  s.low_since = s.low_since.value_or(now);
  s.on = now - *s.low_since < options.stopping;
}

Span patience(const OperationOptions& options, const MachineModel& model) {
  return std::max(options.unknown_after, 3 * model.scan_period);
}

// Nothing is known of the time in between: what went before says nothing of now.
bool lost_sight(const OperationOptions& options, const MachineModel& model, const OperationState& s,
                Instant now) {
  return !s.last_good || now - *s.last_good > patience(options, model);
}

void count_run_time(const OperationOptions& options, const MachineModel& model, OperationState& s,
                    bool was_on, Instant now) {
  if (was_on && s.on && s.last_scan && now - *s.last_scan <= patience(options, model)) {
    s.run_time += now - *s.last_scan;
  }
}

}  // namespace

std::uint32_t starts_within_hour(const OperationState& state, Instant now) {
  const auto known = std::min<std::uint64_t>(state.starts_seen, OperationState::remembered);
  std::uint32_t count = 0;
  for (std::size_t i = 0; i < known; ++i) {
    count += now - state.starts.at(i) < std::chrono::hours{1} ? 1U : 0U;
  }
  return count;
}

OperationState after_scan(const OperationOptions& options, const MachineModel& model,
                          const OperationState& state, const Scan& scan) {
  OperationState next = state;
  const Instant now = scan.time;
  const Evidence seen = evidence(options, model, scan);
  if (lost_sight(options, model, state, now)) {
    next.mode = Mode::unknown;
    next.on = false;
    next.low_since.reset();
  }
  const bool defrosting = good(model, scan, Role::defrost).value_or(0.0) >= 0.5;
  if (seen != Evidence::none) {
    follow(options, next, seen, now);
    next.last_good = now;
    const bool told = next.on || seen == Evidence::off || next.mode != Mode::unknown;
    if (next.on) {
      next.mode = mode_while_on(options, next, defrosting, now);
    } else if (told) {
      next.mode = Mode::off;
    }
  }
  if (state.mode == Mode::defrost && next.mode != Mode::defrost) {
    next.defrost_ended = now;
  }
  if (next.mode != state.mode || !state.last_scan) {
    next.since = now;
  }
  count_run_time(options, model, next, state.on, now);
  next.last_scan = now;
  return next;
}

}  // namespace lostwork
