#include "sensors/run_counter.h"

namespace lostwork {

RunCount counted(const RunCount& before, const RunRule& rule, const Reading& power) {
  if (power.quality != Quality::good) {
    return before;
  }
  RunCount after = before;
  after.last = power.time;
  after.running = power.value_SI >= (before.running ? rule.off_W : rule.on_W);
  if (!before.last) {
    return after;
  }
  const Span passed = power.time - *before.last;
  if (before.running && passed > Span{0} && passed <= rule.longest_gap) {
    after.run += passed;
  }
  if (!before.running && after.running) {
    ++after.starts;
  }
  return after;
}

}  // namespace lostwork
