// A bus as the poller sees it: it can be read, and nothing else.
#pragma once

#include "sensors/decode.h"
#include "thermo/reading.h"

#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

struct BlockRequest {
  std::uint8_t unit = 1;
  Table table = Table::holding;
  std::uint16_t address = 0;  // on the wire
  std::uint16_t count = 1;    // registers 1 to 125, bits 1 to 2000

  friend bool operator==(const BlockRequest&, const BlockRequest&) = default;
};

enum class BusFailure : std::uint8_t {
  exception,   // the device refuses: exception_code says why
  timeout,     // connected, but no whole answer in time
  connection,  // not connected, and not yet time to try again, or the attempt failed
  malformed    // an answer that is not one to this request
};

struct BlockAnswer {
  std::vector<std::uint16_t> words{};   // as many as asked for; a bit is a word of 0 or 1
  std::optional<BusFailure> failure{};  // set: words is empty
  std::uint8_t exception_code = 0;      // with failure exception only
  // The line lost its step just before: the words may belong to an earlier request.
  bool suspect = false;
  Instant time{};  // when the answer came, or the attempt ended
};

// One per bus, used by one thread at a time. A call ends within three of the bus's timeouts
// (connect or wait for a quiet line, pause, answer), however the other side behaves.
class Bus {
 public:
  Bus() = default;
  Bus(const Bus&) = delete;
  Bus& operator=(const Bus&) = delete;
  Bus(Bus&&) = delete;
  Bus& operator=(Bus&&) = delete;
  virtual ~Bus() = default;
  [[nodiscard]] virtual BlockAnswer read(const BlockRequest& request) = 0;
};

}  // namespace lostwork
