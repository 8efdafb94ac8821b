#include "daemon/pipeline.h"

#include <algorithm>

#include <boost/json.hpp>

namespace lostwork {
namespace {

// Who acts until there are accounts: whoever sits at this computer.
constexpr std::string_view local_user = "local";

StepModel model_of(const PlantConfig& plant, const MachineConfig& machine) {
  AlarmRules rules;
  rules.limits = machine.limits;
  rules.tariff = plant.tariff;
  for (const std::size_t i : points_of(plant.wiring, machine.model.id)) {
    const auto* source = std::get_if<FromRegister>(&plant.wiring.points[i].source);
    rules.device_of_point.push_back(source != nullptr ? source->device : std::string{});
  }
  StepModel out = step_model(machine.model, std::move(rules));
  out.health.options.accept_unattended = machine.accept_unattended;
  return out;
}

std::shared_ptr<const MachineLayout> layout_of(const MachineModel& model) {
  auto out = std::make_shared<MachineLayout>();
  out->machine = model.id;
  for (const ModelPoint& point : model.points) {
    out->points.push_back(point.id);
  }
  return out;
}

std::string evidence_json(const std::vector<Figure>& evidence) {
  boost::json::array out;
  for (const Figure& figure : evidence) {
    boost::json::object row{
        { "name",  figure.name},
        {"value", figure.value}
    };
    if (figure.u) {
      row["u"] = *figure.u;
    }
    if (figure.limit) {
      row["limit"] = *figure.limit;
      row["document"] = figure.document;
    }
    out.push_back(std::move(row));
  }
  return boost::json::serialize(boost::json::object{
      {"figures", std::move(out)}
  });
}

}  // namespace

Pipeline::Pipeline(const PlantConfig& plant)
    : offset_{utc_offset_of(plant.timezone).value_or([](Instant) {
        return std::chrono::seconds{0};
      })},
      commit_{plant.commit} {
  for (const MachineConfig& machine : plant.machines) {
    Machine& added = machines_.emplace_back();
    added.model = model_of(plant, machine);
    added.layout = layout_of(added.model.machine);
    added.step.next = fitted(added.model, MachineState{});
  }
}

std::vector<std::string> Pipeline::resume(const History& history) {
  std::vector<std::string> refused;
  for (Machine& machine : machines_) {
    const std::string& id = machine.model.machine.id;
    const auto saved = history.state(id);
    if (!saved) {
      continue;
    }
    if (saved->damaged || saved->version != machine_state_version) {
      refused.push_back(id + ": what was learned " +
                        (saved->damaged ? "is damaged" : "is of another version of the program") +
                        " and begins anew");
      continue;
    }
    auto state = load(machine.model, saved->bytes);
    if (state) {
      machine.step.next = std::move(*state);
    } else {
      refused.push_back(id + ": " + state.error());
    }
  }
  return refused;
}

void Pipeline::take_over(Pipeline& before) {
  for (Machine& machine : machines_) {
    const auto old = std::find_if(
        before.machines_.begin(), before.machines_.end(),
        [&machine](const Machine& m) { return m.layout->machine == machine.layout->machine; });
    if (old != before.machines_.end()) {
      machine.step.next = fitted(machine.model, std::move(old->step.next));
    }
  }
  batch_ = std::move(before.batch_);
}

const MachineStep& Pipeline::take(std::size_t machine, Scan scan) {
  Machine& m = machines_[machine];
  m.step = advance(m.model, std::move(m.step.next), scan);
  if (m.step.fate != ScanFate::taken) {
    return m.step;
  }
  m.changed = true;
  m.scan = scan;
  batch_.scans.push_back({.layout = m.layout,
                          .scan = std::move(scan),
                          .assessment = m.step.assessment,
                          .covers = m.model.machine.scan_period});
  for (const Window& window : m.step.windows) {
    batch_.windows.push_back({.machine = m.model.machine.id, .window = window});
  }
  batch_.findings.insert(batch_.findings.end(), m.step.findings.begin(), m.step.findings.end());
  gather(m.step.alarms);
  return m.step;
}

void Pipeline::gather(const std::vector<AlarmEvent>& events) {
  for (const AlarmEvent& event : events) {
    batch_.alarms.push_back(
        {.time = event.time,
         .utc_offset = std::chrono::duration_cast<std::chrono::minutes>(offset_(event.time)),
         .machine = event.machine,
         .alarm = event.alarm,
         .kind = static_cast<std::uint8_t>(event.kind),
         .from = static_cast<std::uint8_t>(event.from),
         .to = static_cast<std::uint8_t>(event.to),
         .priority = static_cast<std::uint8_t>(event.priority),
         .text = event.text,
         .evidence_json = evidence_json(event.evidence),
         .user = event.user,
         .comment = event.comment});
  }
}

ActionResult Pipeline::acknowledge(std::string_view alarm, std::string_view comment, Instant time) {
  for (Machine& machine : machines_) {
    ActionUpdate update = lostwork::acknowledge(std::move(machine.step.next.alarms),
                                                {.machine = machine.model.machine.id,
                                                 .alarm = std::string{alarm},
                                                 .user = std::string{local_user},
                                                 .comment = std::string{comment},
                                                 .time = time});
    machine.step.next.alarms = std::move(update.next);
    if (update.result != ActionResult::no_such_alarm) {
      machine.changed = true;
      gather(update.events);
      return update.result;
    }
  }
  return ActionResult::no_such_alarm;
}

void Pipeline::set_clock_back(Instant now) {
  for (Machine& machine : machines_) {
    machine.step.next = clock_set_back(std::move(machine.step.next), now);
  }
}

Batch Pipeline::take_batch() {
  for (Machine& machine : machines_) {
    if (machine.changed) {
      batch_.states.push_back({.machine = machine.model.machine.id,
                               .version = machine_state_version,
                               .time = machine.step.next.last_scan.value_or(Instant{}),
                               .bytes = save(machine.step.next)});
      machine.changed = false;
    }
  }
  return std::exchange(batch_, {});
}

}  // namespace lostwork
