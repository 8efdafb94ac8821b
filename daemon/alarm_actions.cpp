#include "daemon/alarm_book.h"

#include <algorithm>
#include <array>
#include <utility>

namespace lostwork {
namespace {

constexpr std::size_t longest_comment = 500;

AlarmSlot* slot_of(AlarmBook& book, std::string_view id) {
  const auto found = std::find_if(book.slots.begin(), book.slots.end(),
                                  [id](const AlarmSlot& slot) { return slot.alarm.id == id; });
  return found == book.slots.end() ? nullptr : &*found;
}

AlarmEvent event_of(const Alarm& alarm, AlarmState from, const AlarmAction& action) {
  return {.time = action.time,
          .machine = action.machine,
          .alarm = alarm.id,
          .kind = alarm.kind,
          .from = from,
          .to = alarm.state,
          .priority = alarm.priority,
          .text = alarm.text,
          .evidence = alarm.evidence,
          .user = action.user,
          .comment = action.comment};
}

ActionUpdate refused(AlarmBook book, ActionResult result) {
  return {.next = std::move(book), .result = result, .events = {}};
}

// None: nothing speaks against it.
std::optional<ActionResult> objection(const AlarmAction& action) {
  if (action.user.empty()) {
    return ActionResult::no_user;
  }
  if (action.comment.size() > longest_comment) {
    return ActionResult::long_comment;
  }
  return std::nullopt;
}

}  // namespace

std::string_view text(ActionResult result) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(ActionResult::count)>
      texts{"done",
            "there is no such alarm",
            "it is acknowledged already, or there is nothing to acknowledge",
            "somebody's name is needed",
            "the comment is empty",
            "the comment is longer than 500 bytes"};
  return texts.at(static_cast<std::size_t>(result));
}

ActionUpdate acknowledge(AlarmBook book, const AlarmAction& action) {
  if (const auto no = objection(action)) {
    return refused(std::move(book), *no);
  }
  AlarmSlot* slot = slot_of(book, action.alarm);
  if (slot == nullptr) {
    return refused(std::move(book), ActionResult::no_such_alarm);
  }
  const AlarmState from = slot->alarm.state;
  const auto to = after(from, AlarmStimulus::acknowledged);
  if (!to) {
    return refused(std::move(book), ActionResult::already);
  }
  slot->alarm.state = *to;
  slot->alarm.acknowledged =
      SeenBy{.time = action.time, .user = action.user, .comment = action.comment};
  ActionUpdate out;
  out.events.push_back(event_of(slot->alarm, from, action));
  out.next = std::move(book);
  return out;
}

ActionUpdate comment(AlarmBook book, const AlarmAction& action) {
  if (const auto no = objection(action)) {
    return refused(std::move(book), *no);
  }
  if (action.comment.empty()) {
    return refused(std::move(book), ActionResult::empty_comment);
  }
  const AlarmSlot* slot = slot_of(book, action.alarm);
  if (slot == nullptr) {
    return refused(std::move(book), ActionResult::no_such_alarm);
  }
  ActionUpdate out;
  out.events.push_back(event_of(slot->alarm, slot->alarm.state, action));
  out.next = std::move(book);
  return out;
}

std::vector<Alarm> current_alarms(const AlarmBook& book) {
  std::vector<Alarm> out;
  for (const AlarmSlot& slot : book.slots) {
    if (slot.alarm.state != AlarmState::normal) {
      out.push_back(slot.alarm);
    }
  }
  std::stable_sort(out.begin(), out.end(), [](const Alarm& a, const Alarm& b) {
    return a.priority != b.priority ? a.priority < b.priority : a.since > b.since;
  });
  return out;
}

}  // namespace lostwork
