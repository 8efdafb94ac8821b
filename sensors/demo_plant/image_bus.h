// The simulated plant's registers as a bus in the same process: the past season goes through the
// very polling and decoding that the live plant goes through, without a socket.
#pragma once

#include "sensors/bus.h"
#include "sensors/demo_plant/registers.h"

namespace lostwork {

class ImageBus final : public Bus {
 public:
  explicit ImageBus(const Plant& plant) : image_{register_image(plant)} {}

  // Shows the plant as it stands now. Not while another thread reads.
  void show(const Plant& plant) { refresh(image_, plant); }

  // Never waits: a silent device is a timeout at once. The answer's time is the plant's.
  [[nodiscard]] BlockAnswer read(const BlockRequest& request) override {
    return answer(image_, request);
  }

 private:
  RegisterImage image_;
};

}  // namespace lostwork
