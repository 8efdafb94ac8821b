// The alarms of one machine as they stand, and what people do to them.
//
// Pure; state in, state out; every transition comes out as an event for the journal.
#pragma once

#include "daemon/alarm.h"
#include "daemon/alarm_rules.h"
#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/health/finding.h"
#include "thermo/reading.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// One rule's alarm with what its delays need.
struct AlarmSlot {
  static constexpr std::size_t remembered = 3;

  Alarm alarm;
  // Of a lost point or detector: the point; of a lost device: the device; of a set point: the
  // limit; as an index. None: the rule is gone, or it is a finding's.
  std::optional<std::uint32_t> subject;
  std::optional<Instant> turning;  // the condition differs from the alarm's state since then
  std::array<Instant, remembered> activations{};  // a ring
  std::uint64_t activated = 0;                    // times
};

// How long a point has not been heard.
struct PointWatch {
  std::optional<Instant> last_good;
  std::optional<Instant> missed_since;
  Quality quality = Quality::good;  // of the last reading
  std::uint32_t missed = 0;         // scans in a row without a usable value
  std::uint32_t silent = 0;         // scans in a row without any answer
};

struct AlarmBook {
  std::vector<AlarmSlot> slots;     // in no order; those of ended findings go when acknowledged
  std::vector<PointWatch> watches;  // one a point of the model
  std::vector<std::string> devices;
  std::vector<std::optional<std::uint32_t>> device_of_point;  // index into devices
};

struct AlarmUpdate {
  AlarmBook next;
  std::vector<AlarmEvent> events;
};

// What the rules look at.
struct AlarmInput {
  const Scan& scan;
  const Assessment& assessment;
  const std::vector<Finding>& findings;  // changed by this scan
};
[[nodiscard]] AlarmUpdate after_scan(const MachineModel& model, const AlarmRules& rules,
                                     AlarmBook book, const AlarmInput& input);

// Slots and watches for the model's points, devices and limits; those that are there already are
// kept. An alarm whose rule is gone returns to normal with the next scan.
[[nodiscard]] AlarmBook fitted(const MachineModel& model, const AlarmRules& rules, AlarmBook book);

// All that are not normal: danger first, then the newest first.
[[nodiscard]] std::vector<Alarm> current_alarms(const AlarmBook& book);

// What a person does to an alarm.
struct AlarmAction {
  std::string machine;  // MachineModel::id, for the journal
  std::string alarm;    // Alarm::id
  std::string user;     // not empty
  std::string comment;  // at most 500 bytes; not empty in a comment
  Instant time{};
};
enum class ActionResult : std::uint8_t {
  done = 0,
  no_such_alarm,
  already,        // acknowledged before, or nothing to acknowledge
  no_user,        // nobody's name is given
  empty_comment,  // a comment that says nothing
  long_comment,
  count
};
[[nodiscard]] std::string_view text(ActionResult result);

struct ActionUpdate {
  AlarmBook next;  // unchanged unless done
  ActionResult result = ActionResult::done;
  std::vector<AlarmEvent> events;
};
[[nodiscard]] ActionUpdate acknowledge(AlarmBook book, const AlarmAction& action);
[[nodiscard]] ActionUpdate comment(AlarmBook book, const AlarmAction& action);

template <class Archive>
void archive(Archive& a, Figure& f) {
  a(f.name, f.value, f.u, f.limit, f.document);
}
template <class Archive>
void archive(Archive& a, SeenBy& s) {
  a(s.time, s.user, s.comment);
}
template <class Archive>
void archive(Archive& a, Alarm& s) {
  a(s.id, s.kind, s.priority, s.state, s.since, s.returned, s.acknowledged, s.chattering, s.text,
    s.evidence);
}
template <class Archive>
void archive(Archive& a, AlarmSlot& s) {
  a(s.alarm, s.subject, s.turning, s.activations, s.activated);
}
template <class Archive>
void archive(Archive& a, PointWatch& s) {
  a(s.last_good, s.missed_since, s.quality, s.missed, s.silent);
}
template <class Archive>
void archive(Archive& a, AlarmBook& s) {
  a(s.slots, s.watches, s.devices, s.device_of_point);
}

}  // namespace lostwork
