// The machines of one plant with their states: every scan goes through here, whoever has read it
// (the live loop, the demonstration's past season, a recorded history), and what it makes is
// gathered for the store.
//
// One thread. No clock, no file.
#pragma once

#include "config/plant_config.h"
#include "daemon/advance.h"
#include "daemon/local_time.h"
#include "storage/history.h"
#include "storage/rows.h"

#include <cstddef>
#include <memory>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

class Pipeline {
 public:
  explicit Pipeline(const PlantConfig& plant);

  // Takes up the states of an earlier run. One sentence for each that cannot be used (damaged, or
  // of another version): that machine begins anew.
  [[nodiscard]] std::vector<std::string> resume(const History& history);

  // After the plant file was read anew: the states of machines that are still there are kept.
  void take_over(Pipeline& before);

  // Valid until the next call.
  const MachineStep& take(std::size_t machine, Scan scan);

  [[nodiscard]] ActionResult acknowledge(std::string_view alarm, std::string_view comment,
                                         Instant time);

  // The host's clock was set back: see clock_set_back in advance.h.
  void set_clock_back(Instant now);

  [[nodiscard]] std::size_t size() const { return machines_.size(); }
  [[nodiscard]] const StepModel& model(std::size_t machine) const {
    return machines_[machine].model;
  }
  [[nodiscard]] const MachineState& state(std::size_t machine) const {
    return machines_[machine].step.next;
  }
  [[nodiscard]] const MachineStep& last_step(std::size_t machine) const {
    return machines_[machine].step;
  }
  [[nodiscard]] const Scan& last_scan(std::size_t machine) const { return machines_[machine].scan; }

  // Whether what was gathered should be stored now.
  [[nodiscard]] bool due() const { return batch_.due(commit_); }
  // What was gathered since the last call, with the states as they are now.
  [[nodiscard]] Batch take_batch();

 private:
  struct Machine {
    StepModel model;
    std::shared_ptr<const MachineLayout> layout;
    MachineStep step;
    Scan scan;
    bool changed = false;  // since the last batch
  };

  void gather(const std::vector<AlarmEvent>& events);

  std::vector<Machine> machines_;
  UtcOffset offset_;
  Span commit_;
  Batch batch_;
};

}  // namespace lostwork
