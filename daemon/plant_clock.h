// The time at the plant: the host's, or that of a simulated plant that runs faster.
#pragma once

#include "thermo/reading.h"

#include <chrono>

namespace lostwork {

using SteadyTime = std::chrono::steady_clock::time_point;

class PlantClock {
 public:
  PlantClock() = default;  // the host's clock
  // Simulated: `start` now, `speed` times as fast from here on.
  PlantClock(Instant start, double speed)
      : simulated_{true}, start_{start}, speed_{speed}, since_{std::chrono::steady_clock::now()} {}

  [[nodiscard]] Instant now() const {
    if (!simulated_) {
      return std::chrono::floor<Span>(std::chrono::system_clock::now());
    }
    const std::chrono::duration<double, std::milli> real =
        std::chrono::steady_clock::now() - since_;
    return start_ + std::chrono::floor<Span>(real * speed_);
  }
  // How long it really takes until the plant's clock shows `time`; 0 for what is past.
  [[nodiscard]] std::chrono::steady_clock::duration until(Instant time) const {
    const std::chrono::duration<double, std::milli> left = (time - now()) / speed_;
    return std::chrono::duration_cast<std::chrono::steady_clock::duration>(
        std::max(left, std::chrono::duration<double, std::milli>::zero()));
  }
  [[nodiscard]] double speed() const { return speed_; }

 private:
  bool simulated_ = false;
  Instant start_{};
  double speed_ = 1.0;
  SteadyTime since_{};
};

}  // namespace lostwork
