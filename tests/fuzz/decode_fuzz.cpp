// Modbus answers and register words as a hostile device might send them.
//
// Input: what the request was (8 bytes: transaction 2, unit, table, address 2, count 2), how the
// words are to be decoded (type, order), then the frame as it came over TCP. The same bytes are
// tried as a serial frame.
#include "sensors/blocks.h"
#include "sensors/decode.h"
#include "sensors/frame.h"
#include "sensors/point.h"

#include <cmath>
#include <cstddef>
#include <cstdint>
#include <cstdlib>
#include <span>

namespace lostwork {
namespace {

constexpr std::size_t head = 10;

void must(bool holds) {
  if (!holds) {
    std::abort();
  }
}

std::uint16_t word(std::span<const std::uint8_t> bytes, std::size_t i) {
  return static_cast<std::uint16_t>((bytes[i] << 8U) | bytes[i + 1]);
}

template <class E>
E enumerator(std::uint8_t byte) {
  return static_cast<E>(byte % static_cast<std::uint8_t>(E::count));
}

// An answer has all its words or none, and a value that is passed on is finite.
void check(const BlockRequest& request, const RegisterSpec& spec, const BlockAnswer& answer) {
  must(answer.words.size() == (answer.failure ? 0U : request.count));
  for (std::size_t i = 0; i < answer.words.size(); ++i) {
    const auto value = decode(spec, std::span{answer.words}.subspan(i));
    if (!value) {
      must(value.error() == Quality::sentinel || value.error() == Quality::out_of_range);
      continue;
    }
    must(std::isfinite(*value));
    PointSpec point;
    point.role = Role::suction_pressure;
    point.unit = Unit::bar_gauge;
    point.accuracies = {PercentOfReading{.percent = 1.0}};
    const Reading reading = reading_of(point, *value, 100.0, Instant{});
    must(reading.quality != Quality::good || (reading.value_SI > 0.0 && reading.u_SI >= 0.0));
  }
}

void try_answer(std::span<const std::uint8_t> bytes) {
  if (bytes.size() < head) {
    return;
  }
  const std::uint16_t transaction = word(bytes, 0);
  BlockRequest request{.unit = bytes[2],
                       .table = enumerator<Table>(bytes[3]),
                       .address = word(bytes, 4),
                       .count = 1};
  const int most = holds_bits(request.table) ? 2000 : 125;
  request.count = static_cast<std::uint16_t>(1 + word(bytes, 6) % most);
  const RegisterSpec spec{
      .type = enumerator<RawType>(bytes[8]),
      .order = enumerator<ByteOrder>(bytes[9]),
      .scale = 0.1,
      .sentinels = {0x8000, 0x7FC00000}
  };
  const auto frame = bytes.subspan(head);
  check(request, spec, tcp_answer(request, transaction, frame));
  check(request, spec, rtu_answer(request, frame));
}

}  // namespace
}  // namespace lostwork

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* bytes, std::size_t size) {
  lostwork::try_answer({bytes, size});
  return 0;
}
