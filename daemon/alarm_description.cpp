#include "daemon/alarm_description.h"

#include "daemon/alarm_text.h"
#include "daemon/alarm_watch.h"

#include <algorithm>
#include <utility>

namespace lostwork {
namespace {

bool is_of_a_loss(AlarmKind kind) {
  return kind == AlarmKind::point_lost || kind == AlarmKind::device_lost;
}

bool belongs_to(const AlarmScene& scene, const AlarmSlot& slot, std::size_t point) {
  return slot.alarm.kind == AlarmKind::device_lost
             ? scene.book.device_of_point[point] == *slot.subject
             : point == *slot.subject;
}

// Indices of the points that the alarm is about.
std::vector<std::size_t> points_of(const AlarmScene& scene, const AlarmSlot& slot) {
  std::vector<std::size_t> out;
  for (std::size_t i = 0; i < scene.model.points.size(); ++i) {
    if (belongs_to(scene, slot, i)) {
      out.push_back(i);
    }
  }
  return out;
}

Loss loss_of(const AlarmScene& scene, const AlarmSlot& slot,
             const std::vector<std::size_t>& points) {
  const bool of_device = slot.alarm.kind == AlarmKind::device_lost;
  Loss out{.machine = scene.model.name,
           .subject = of_device ? std::string_view{scene.book.devices.at(*slot.subject)}
                                : std::string_view{scene.model.points.at(*slot.subject).id},
           .since = slot.alarm.since,
           .blind = {}};
  for (const SafetyLimit& limit : scene.rules.limits) {
    if (std::any_of(points.begin(), points.end(), [&](std::size_t i) {
          return scene.model.points[i].role == role_of(limit.kind);
        })) {
      out.blind.push_back(limit.kind);
    }
  }
  return out;
}

Description describe_loss(const AlarmScene& scene, const AlarmSlot& slot, bool occurs) {
  const std::vector<std::size_t> points = points_of(scene, slot);
  const Loss loss = loss_of(scene, slot, points);
  std::uint32_t missed = 0;
  for (const std::size_t i : points) {
    missed = std::max(missed, scene.book.watches[i].missed);
  }
  Description out;
  out.evidence = {
      {      .name = "points",.value = static_cast<double>(points.size())                                                            },
      { .name = "missed_scans",
       .value = static_cast<double>(missed),.limit = static_cast<double>(scene.rules.timings.lost_polls)}
  };
  if (!occurs) {
    out.text = heard_again_text(loss);
  } else if (slot.alarm.kind == AlarmKind::device_lost) {
    out.text = device_lost_text(loss, points.size());
  } else {
    out.text = point_lost_text(loss, scene.model.points.at(*slot.subject).role,
                               scene.book.watches.at(*slot.subject).quality);
  }
  return out;
}

std::vector<Figure> figures_of(const SafetyLimit& limit, const std::optional<Measured>& value_SI) {
  const EdgeUnit unit = edge_unit(limit.kind);
  const auto edge = [&unit](double SI) { return SI * unit.per_SI + unit.offset; };
  std::vector<Figure> out;
  if (value_SI) {
    out.push_back({.name = std::string{unit.suffix},
                   .value = edge(value_SI->value),
                   .u = value_SI->u * unit.per_SI,
                   .limit = edge(limit.limit_SI),
                   .document = limit.document});
  }
  out.push_back({.name = std::string{"speaks_at_"}.append(unit.suffix),
                 .value = edge(speaks_at_SI(limit)),
                 .document = limit.document});
  return out;
}

Description describe_safety(const AlarmScene& scene, const AlarmSlot& slot, bool occurs,
                            const std::optional<Measured>& value_SI) {
  const bool lost = slot.alarm.kind == AlarmKind::detector_lost;
  const std::string_view point =
      lost ? std::string_view{scene.model.points.at(*slot.subject).id} : std::string_view{};
  const SafetyLimit& limit =
      lost ? *detector_limit(scene.rules, scene.model.points.at(*slot.subject).role)
           : scene.rules.limits.at(*slot.subject);
  const SafetyMatter matter{.kind = slot.alarm.kind,
                            .machine = scene.model.name,
                            .limit = limit,
                            .value_SI = value_SI ? std::optional{value_SI->value} : std::nullopt,
                            .point = point,
                            .since = slot.alarm.since};
  return {.text = occurs ? safety_text(matter) : safety_return_text(matter),
          .evidence = figures_of(limit, value_SI)};
}

}  // namespace

Description describe(const AlarmScene& scene, const AlarmSlot& slot, bool occurs,
                     const std::optional<Measured>& value_SI) {
  return is_of_a_loss(slot.alarm.kind) ? describe_loss(scene, slot, occurs)
                                       : describe_safety(scene, slot, occurs, value_SI);
}

Instant begin_of(const AlarmScene& scene, const AlarmSlot& slot, Instant now) {
  Instant begin = slot.turning.value_or(now);
  if (is_of_a_loss(slot.alarm.kind) || slot.alarm.kind == AlarmKind::detector_lost) {
    for (const std::size_t i : points_of(scene, slot)) {
      begin = std::min(begin, scene.book.watches[i].missed_since.value_or(begin));
    }
  }
  return begin;
}

}  // namespace lostwork
