#include "daemon/alarm_book.h"

#include "daemon/alarm_description.h"
#include "daemon/alarm_text.h"
#include "daemon/alarm_watch.h"

#include <algorithm>
#include <utility>

namespace lostwork {
namespace {

constexpr std::chrono::minutes chatter_within{1};

bool is_of_a_finding(AlarmKind kind) {
  return kind == AlarmKind::drift || kind == AlarmKind::sensor_suspect;
}

void note_activation(AlarmSlot& slot, Instant now) {
  slot.activations.at(slot.activated % AlarmSlot::remembered) = now;
  ++slot.activated;
  const Instant oldest = slot.activations.at(slot.activated % AlarmSlot::remembered);
  slot.alarm.chattering = slot.activated >= AlarmSlot::remembered && now - oldest <= chatter_within;
}

// The stimulus, once the condition has lasted for its delay.
std::optional<AlarmStimulus> stimulus(AlarmSlot& slot, Condition condition,
                                      const AlarmTiming& timing, Instant now) {
  if (condition == Condition::unknown) {
    return std::nullopt;
  }
  const bool occurs = condition == Condition::yes;
  if (occurs == is_active(slot.alarm.state)) {
    slot.turning.reset();
    return std::nullopt;
  }
  slot.turning = slot.turning.value_or(now);
  const Span delay = occurs                  ? timing.on_delay
                     : slot.alarm.chattering ? 2 * timing.off_delay
                                             : timing.off_delay;
  if (now - *slot.turning < delay) {
    return std::nullopt;
  }
  return occurs ? AlarmStimulus::occurs : AlarmStimulus::returns;
}

class Round {
 public:
  Round(const MachineModel& model, const AlarmRules& rules, AlarmBook& book,
        const AlarmInput& input)
      : model_{model}, rules_{rules}, book_{book}, input_{input} {}

  std::vector<AlarmEvent> run() {
    take_up(book_.watches, model_, input_.scan);
    down_.assign(book_.devices.size(), false);
    for (std::size_t i = 0; i < down_.size(); ++i) {
      down_[i] = is_down(i);
    }
    for (AlarmSlot& slot : book_.slots) {
      if (!is_of_a_finding(slot.alarm.kind)) {
        look_at(slot);
      }
    }
    for (const Finding& finding : input_.findings) {
      look_at(finding);
    }
    forget_what_is_over();
    return std::move(events_);
  }

 private:
  [[nodiscard]] Instant now() const { return input_.scan.time; }

  [[nodiscard]] bool is_down(std::size_t device) const {
    bool any = false;
    for (std::size_t i = 0; i < book_.watches.size(); ++i) {
      if (book_.device_of_point[i] != device) {
        continue;
      }
      if (!is_silent(book_.watches[i], rules_.timings, now())) {
        return false;
      }
      any = true;
    }
    return any;
  }

  // A lost device is the root of its points' losses: they are counted under it. A detector that is
  // not seen is never put behind anything.
  [[nodiscard]] Condition point_condition(std::size_t point) const {
    const auto device = book_.device_of_point.at(point);
    if (device && down_.at(*device)) {
      return Condition::unknown;
    }
    return is_lost(book_.watches.at(point), rules_.timings, now()) ? Condition::yes : Condition::no;
  }

  [[nodiscard]] Watched watched_by(const AlarmSlot& slot) const {
    const std::size_t subject = *slot.subject;
    switch (slot.alarm.kind) {
      case AlarmKind::device_lost:
        return {.condition = down_.at(subject) ? Condition::yes : Condition::no};
      case AlarmKind::point_lost: return {.condition = point_condition(subject)};
      case AlarmKind::detector_lost:
        return {.condition = is_detector_lost(book_.watches.at(subject), rules_.timings)
                                 ? Condition::yes
                                 : Condition::no};
      default:
        return watch(rules_.limits.at(subject), model_, rules_.timings, input_,
                     is_active(slot.alarm.state));
    }
  }

  void look_at(AlarmSlot& slot) {
    if (!slot.subject) {
      if (is_active(slot.alarm.state)) {
        change(slot, AlarmStimulus::returns, "The rule is gone from the plant file.", {});
      }
      return;
    }
    const Watched seen = watched_by(slot);
    const auto what =
        stimulus(slot, seen.condition, timing_of(slot.alarm.kind, rules_.timings), now());
    if (!what) {
      return;
    }
    const bool occurs = *what == AlarmStimulus::occurs;
    const AlarmScene scene{.model = model_, .rules = rules_, .book = book_};
    if (occurs) {
      slot.alarm.since = begin_of(scene, slot, now());
    }
    Description said = describe(scene, slot, occurs, seen.value_SI);
    change(slot, *what, std::move(said.text), std::move(said.evidence));
  }

  void look_at(const Finding& finding) {
    auto slot = std::find_if(book_.slots.begin(), book_.slots.end(), [&](const AlarmSlot& s) {
      return is_of_a_finding(s.alarm.kind) && s.alarm.id == finding.id;
    });
    const bool active = finding.state == FindingState::active;
    if (slot == book_.slots.end()) {
      if (!active) {
        return;
      }
      AlarmSlot fresh;
      fresh.alarm.id = finding.id;
      fresh.alarm.kind = finding.kind == FindingKind::efficiency_drift ? AlarmKind::drift
                                                                       : AlarmKind::sensor_suspect;
      fresh.alarm.priority = AlarmPriority::cost;
      slot = book_.slots.insert(book_.slots.end(), std::move(fresh));
    }
    if (active && is_active(slot->alarm.state)) {
      slot->alarm.text = finding_text(model_.name, finding);
      slot->alarm.evidence = finding_figures(finding);
    } else if (active) {
      slot->alarm.since = finding.confirmed.value_or(now());
      change(*slot, AlarmStimulus::occurs, finding_text(model_.name, finding),
             finding_figures(finding));
    } else if (is_active(slot->alarm.state)) {
      change(*slot, AlarmStimulus::returns, finding_over_text(model_.name, finding),
             finding_figures(finding));
    }
  }

  void change(AlarmSlot& slot, AlarmStimulus what, std::string text, std::vector<Figure> evidence) {
    Alarm& alarm = slot.alarm;
    const AlarmState from = alarm.state;
    const auto to = after(from, what);
    if (!to) {
      return;
    }
    alarm.state = *to;
    slot.turning.reset();
    if (what == AlarmStimulus::occurs) {
      note_activation(slot, now());
      if (alarm.chattering) {
        text += " It comes and goes: three times within a minute.";
      }
      alarm.returned.reset();
      alarm.acknowledged.reset();
      alarm.text = text;
      alarm.evidence = evidence;
    } else {
      alarm.returned = now();
    }
    events_.push_back({.time = now(),
                       .machine = model_.id,
                       .alarm = alarm.id,
                       .kind = alarm.kind,
                       .from = from,
                       .to = alarm.state,
                       .priority = alarm.priority,
                       .text = std::move(text),
                       .evidence = std::move(evidence),
                       .user = {},
                       .comment = {}});
  }

  void forget_what_is_over() {
    const auto over = [](const AlarmSlot& slot) {
      return !slot.subject && slot.alarm.state == AlarmState::normal;
    };
    if (std::any_of(book_.slots.begin(), book_.slots.end(), over)) {
      book_.slots.erase(std::remove_if(book_.slots.begin(), book_.slots.end(), over),
                        book_.slots.end());
    }
  }

  const MachineModel& model_;
  const AlarmRules& rules_;
  AlarmBook& book_;
  const AlarmInput& input_;
  std::vector<bool> down_;
  std::vector<AlarmEvent> events_;
};

bool fits(const MachineModel& model, const AlarmBook& book) {
  return book.watches.size() == model.points.size() &&
         book.device_of_point.size() == model.points.size();
}

}  // namespace

AlarmUpdate after_scan(const MachineModel& model, const AlarmRules& rules, AlarmBook book,
                       const AlarmInput& input) {
  if (!fits(model, book)) {
    book = fitted(model, rules, std::move(book));
  }
  AlarmUpdate out;
  out.events = Round{model, rules, book, input}.run();
  out.next = std::move(book);
  return out;
}

}  // namespace lostwork
