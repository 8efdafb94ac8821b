// A machine with a life of its own, played through advance(): it starts and stops, its load and its
// noise change, its readings fail now and then, its discharge pressure comes near the limit.
#pragma once

#include "daemon/advance.h"

#include <cstdint>
#include <random>
#include <vector>

namespace lostwork::test {

// Model and scans; the same seed gives the same ones.
class StepRun {
 public:
  explicit StepRun(std::uint64_t seed = 1);

  [[nodiscard]] const StepModel& model() const { return model_; }
  [[nodiscard]] std::vector<Scan> scans(int n);  // the next ones, 10 s apart
  bool calm = false;                             // runs evenly, and nothing fails

 private:
  Scan next();

  StepModel model_;
  Scan perfect_;
  std::mt19937_64 random_;
  int count_ = 0;
};

// Everything that came out, one scan after the other.
struct Outcome {
  MachineState state;
  std::vector<Assessment> assessments;
  std::vector<Window> windows;
  std::vector<AlarmEvent> alarms;
};
void play(const StepModel& model, const std::vector<Scan>& scans, Outcome& outcome);

[[nodiscard]] bool same(const Assessment& a, const Assessment& b);
[[nodiscard]] bool same(const Window& a, const Window& b);
// Fails the test where they differ; to the last bit.
void expect_same(const Outcome& a, const Outcome& b);

}  // namespace lostwork::test
