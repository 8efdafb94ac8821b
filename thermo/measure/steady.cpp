#include "thermo/measure/steady.h"

#include "thermo/measure/window_of.h"

#include <algorithm>
#include <cmath>
#include <utility>

namespace lostwork {
namespace {

constexpr Span block_length{60000};
// Sampling times jitter; a window that lacks less than half a scan is whole.
constexpr int jitter_share = 2;
constexpr double longest_window = 1.25;  // of the nominal one, when scans were lost

double seconds(Span span) {
  return std::chrono::duration<double>(span).count();
}

Span longest_gap(const SteadyOptions& options, const MachineModel& model) {
  return std::max(options.gap, 2 * model.scan_period + model.scan_period / 4);
}

std::uint32_t scans_in_block(const MachineModel& model) {
  const double n = std::round(seconds(block_length) / seconds(model.scan_period));
  return n >= 1.0 ? static_cast<std::uint32_t>(n) : 1U;
}

void empty(SteadyBlock& block, std::size_t points) {
  block.scans = 0;
  block.signals.assign(points, {});
  block.quantities.assign(quantity_count, {});
}

void forget_samples(SteadyState& state, std::size_t points) {
  state.blocks.clear();
  state.joined.assign(points, {});
  empty(state.open, points);
}

void fit_to_model(SteadyState& state, std::size_t points) {
  if (state.signals.size() != points) {
    state.signals.assign(points, {});
  }
  if (state.open.signals.size() != points || state.joined.size() != points) {
    forget_samples(state, points);
  }
}

void take_samples(const SteadyOptions& options, const MachineModel& model, SteadyState& state,
                  const SteadyInput& input) {
  SteadyBlock& open = state.open;
  if (open.scans == 0) {
    open.begin = input.scan.time;
  }
  open.end = input.scan.time;
  ++open.scans;
  const double t = seconds(open.end - open.begin);
  const Span gap = longest_gap(options, model);
  for (std::size_t i = 0; i < model.points.size() && i < input.scan.readings.size(); ++i) {
    const Reading& reading = input.scan.readings[i];
    if (reading.quality == Quality::good && std::isfinite(reading.value_SI) &&
        limit_of(options.limits, model.points[i].role) != nullptr) {
      see(state.signals[i], reading.value_SI, input.scan.time, gap);
      open.signals[i].add(t, reading.value_SI);
    }
  }
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto& value = input.values[static_cast<Quantity>(i)];
    if (value) {
      open.quantities[i].add(value->value, value->u);
    }
  }
}

std::uint32_t scans_from(const std::vector<SteadyBlock>& blocks, std::size_t first) {
  std::uint32_t n = 0;
  for (std::size_t i = first; i < blocks.size(); ++i) {
    n += blocks[i].scans;
  }
  return n;
}

bool is_whole(const SteadyOptions& options, const MachineModel& model, Instant begin, Instant end) {
  return end - begin + model.scan_period + model.scan_period / jitter_share >= options.window;
}

bool front_is_spare(const SteadyOptions& options, const MachineModel& model,
                    const std::vector<SteadyBlock>& blocks) {
  if (blocks.size() < 2) {
    return false;
  }
  const Instant end = blocks.back().end;
  if (seconds(end - blocks[0].begin) > longest_window * seconds(options.window)) {
    return true;
  }
  return is_whole(options, model, blocks[1].begin, end) &&
         scans_from(blocks, 1) >= options.good_least;
}

void close_block(const SteadyOptions& options, const MachineModel& model, SteadyState& state) {
  SteadyBlock spare;
  state.blocks.push_back(std::move(state.open));
  while (front_is_spare(options, model, state.blocks)) {
    spare = std::move(state.blocks.front());
    state.blocks.erase(state.blocks.begin());
  }
  state.open = std::move(spare);
  empty(state.open, model.points.size());
  state.joined.assign(model.points.size(), {});
  for (const SteadyBlock& block : state.blocks) {
    const double later = seconds(block.begin - state.blocks.front().begin);
    for (std::size_t i = 0; i < state.joined.size(); ++i) {
      state.joined[i].join(block.signals[i], later);
    }
  }
}

bool too_soon(const SteadyOptions& options, const SteadyState& state,
              const OperationState& operation, Instant now) {
  return now - operation.on_since < options.after_start ||
         (operation.defrost_ended && now - *operation.defrost_ended < options.after_defrost) ||
         (state.edge && now - *state.edge < options.after_edge);
}

// Samples that must be good in a window of this length.
double samples_needed(const SteadyOptions& options, const MachineModel& model, Span length) {
  const double due = seconds(length) / seconds(model.scan_period);
  const double share = std::min<double>(options.good_enough, options.good_share * due);
  return std::max<double>(options.good_least, share);
}

class Judge {
 public:
  Judge(const SteadyOptions& options, const MachineModel& model, const SteadyState& state,
        Instant now)
      : options_{options},
        model_{model},
        state_{state},
        now_{now},
        begin_{state.blocks.front().begin},
        needed_{samples_needed(options, model, now - begin_)} {}

  [[nodiscard]] SteadyVerdict verdict() const {
    SteadyVerdict worst{.cause = UnsteadyCause::none};
    double most = 1.0;
    for (std::size_t i = 0; i < model_.points.size(); ++i) {
      const Role role = model_.points[i].role;
      const LineSums sums = all_samples(i);
      if (limit_of(options_.limits, role) == nullptr || (sums.n == 0 && role != Role::power)) {
        continue;
      }
      if (has_gap(state_.signals[i], sums)) {
        return {.cause = UnsteadyCause::gap, .point = i};
      }
      const Unrest found = unrest(options_.limits, role, state_.signals[i], sums, options_.window);
      if (const double size = std::max(found.change, found.scatter); !(size <= most)) {
        most = size;
        worst = {
            .cause = found.change >= found.scatter ? UnsteadyCause::trend : UnsteadyCause::scatter,
            .point = i};
      }
    }
    return worst;
  }

 private:
  [[nodiscard]] LineSums all_samples(std::size_t point) const {
    LineSums sums = state_.joined[point];
    sums.join(state_.open.signals[point], seconds(state_.open.begin - begin_));
    return sums;
  }
  [[nodiscard]] bool has_gap(const SteadySignal& signal, const LineSums& sums) const {
    return sums.n < needed_ || !signal.last_good ||
           now_ - *signal.last_good > longest_gap(options_, model_) ||
           (signal.gap_ended && *signal.gap_ended > begin_);
  }

  const SteadyOptions& options_;
  const MachineModel& model_;
  const SteadyState& state_;
  Instant now_;
  Instant begin_;
  double needed_;
};

SteadyVerdict judge(const SteadyOptions& options, const MachineModel& model,
                    const SteadyState& state, const OperationState& operation, Instant now) {
  if (operation.mode == Mode::cycling) {
    return {.cause = UnsteadyCause::cycling};
  }
  if (operation.mode != Mode::running) {
    return {.cause = UnsteadyCause::not_running};
  }
  if (too_soon(options, state, operation, now)) {
    return {.cause = UnsteadyCause::hold_off};
  }
  if (state.blocks.empty() ||
      !is_whole(options, model, state.blocks.front().begin, state.blocks.back().end)) {
    return {.cause = UnsteadyCause::filling};
  }
  return Judge{options, model, state, now}.verdict();
}

void learn_scatter(const SteadyOptions& options, const MachineModel& model, SteadyState& state) {
  if (state.learned_until && state.blocks.front().begin <= *state.learned_until) {
    return;
  }
  state.learned_until = state.blocks.back().end;
  for (std::size_t i = 0; i < model.points.size(); ++i) {
    if (state.joined[i].n >= options.good_least) {
      learn(options.limits, model.points[i].role, state.signals[i], state.joined[i]);
    }
  }
}

std::optional<Window> close_window(SteadyState& state, Duty duty) {
  if (state.used_until && state.blocks.front().begin <= *state.used_until) {
    return std::nullopt;
  }
  state.used_until = state.blocks.back().end;
  WindowSums sums{.begin = state.blocks.front().begin, .end = state.blocks.back().end};
  for (const SteadyBlock& block : state.blocks) {
    sums.scans += block.scans;
    for (std::size_t i = 0; i < quantity_count; ++i) {
      sums.quantities.at(i).join(block.quantities[i]);
    }
  }
  return window_of(sums, duty);
}

void note_mode_word(const MachineModel& model, SteadyState& state, const Scan& scan) {
  const auto index = model.index_of(Role::mode);
  if (!index || *index >= scan.readings.size() || scan.readings[*index].quality != Quality::good) {
    return;
  }
  const double word = scan.readings[*index].value_SI;
  if (state.mode_word && *state.mode_word != word) {
    state.edge = scan.time;
  }
  state.mode_word = word;
}

}  // namespace

SteadyStep after_scan(const SteadyOptions& options, const MachineModel& model, SteadyState state,
                      const SteadyInput& input) {
  const Instant now = input.scan.time;
  const std::size_t points = model.points.size();
  const Span gap = longest_gap(options, model);
  fit_to_model(state, points);
  note_mode_word(model, state, input.scan);
  const bool followed = state.last_scan && now - *state.last_scan <= gap;
  if (!followed || input.operation.mode != Mode::running) {
    forget_samples(state, points);
  }
  bool closed = false;
  if (input.operation.mode == Mode::running) {
    take_samples(options, model, state, input);
    closed = state.open.scans >= scans_in_block(model);
    if (closed) {
      close_block(options, model, state);
    }
  }
  SteadyStep out;
  out.verdict = judge(options, model, state, input.operation, now);
  const bool judged = out.verdict.cause >= UnsteadyCause::gap || out.verdict.steady();
  if (closed && judged) {
    learn_scatter(options, model, state);
  }
  if (closed && out.verdict.steady()) {
    out.window = close_window(state, model.duty);
  }
  if (input.operation.on && followed) {
    count_running(state.days, points, now, now - *state.last_scan, out.verdict);
  }
  state.last_scan = now;
  out.next = std::move(state);
  return out;
}

}  // namespace lostwork
