#include "sensors/demo_plant/reply.h"

namespace lostwork {
namespace {

constexpr std::size_t header = 6;       // transaction, protocol, length: two bytes each
constexpr std::size_t least_rest = 2;   // unit and function
constexpr std::size_t most_rest = 254;  // of a whole frame of 260 bytes
constexpr std::size_t whole_read = 12;  // header, unit, function, address, count
constexpr std::uint8_t refused = 0x80;
constexpr std::uint8_t bad_function = 1;
constexpr std::uint8_t bad_value = 3;

std::uint16_t word_at(std::span<const std::uint8_t> bytes, std::size_t at) {
  return static_cast<std::uint16_t>((bytes[at] << 8U) | bytes[at + 1]);
}

void put_word(std::vector<std::uint8_t>& bytes, std::uint16_t word) {
  bytes.push_back(static_cast<std::uint8_t>(word >> 8U));
  bytes.push_back(static_cast<std::uint8_t>(word & 0xffU));
}

std::optional<Table> table_of(std::uint8_t function) {
  switch (function) {
    case 1: return Table::coil;
    case 2: return Table::discrete;
    case 3: return Table::holding;
    case 4: return Table::input;
    default: return std::nullopt;
  }
}

std::vector<std::uint8_t> framed(std::span<const std::uint8_t> request,
                                 std::span<const std::uint8_t> pdu) {
  std::vector<std::uint8_t> bytes;
  put_word(bytes, word_at(request, 0));
  put_word(bytes, 0);
  put_word(bytes, static_cast<std::uint16_t>(pdu.size() + 1));
  bytes.push_back(request[header]);
  bytes.insert(bytes.end(), pdu.begin(), pdu.end());
  return bytes;
}

std::vector<std::uint8_t> exception(std::span<const std::uint8_t> request, std::uint8_t code) {
  const std::array<std::uint8_t, 2> pdu{static_cast<std::uint8_t>(request[header + 1] | refused),
                                        code};
  return framed(request, pdu);
}

// Bits go eight to a byte, the first one lowest.
void put_bits(std::vector<std::uint8_t>& pdu, std::span<const std::uint16_t> bits) {
  for (std::size_t i = 0; i < bits.size(); ++i) {
    if (i % 8 == 0) {
      pdu.push_back(0);
    }
    pdu.back() = static_cast<std::uint8_t>(pdu.back() | ((bits[i] & 1U) << (i % 8)));
  }
}

bool is_silent(const RegisterImage& image, std::uint8_t unit) {
  for (const DeviceImage& device : image.devices) {
    if (device.unit == unit) {
      return !device.answers;
    }
  }
  return true;
}

}  // namespace

std::optional<std::size_t> frame_length(std::span<const std::uint8_t> received) {
  if (received.size() < header) {
    return 0;
  }
  const std::size_t rest = word_at(received, 4);
  if (word_at(received, 2) != 0 || rest < least_rest || rest > most_rest) {
    return std::nullopt;
  }
  return received.size() < header + rest ? 0 : header + rest;
}

std::vector<std::uint8_t> reply(const RegisterImage& image, std::span<const std::uint8_t> frame) {
  const std::uint8_t unit = frame[header];
  const std::uint8_t function = frame[header + 1];
  if (is_silent(image, unit)) {
    return {};
  }
  const auto table = table_of(function);
  if (!table) {
    return exception(frame, bad_function);
  }
  if (frame.size() != whole_read) {
    return exception(frame, bad_value);
  }
  const BlockAnswer found = answer(
      image,
      {.unit = unit, .table = *table, .address = word_at(frame, 8), .count = word_at(frame, 10)});
  if (found.failure) {
    return exception(frame, found.exception_code);
  }
  std::vector<std::uint8_t> pdu{function, 0};
  if (holds_bits(*table)) {
    put_bits(pdu, found.words);
  } else {
    for (const std::uint16_t word : found.words) {
      put_word(pdu, word);
    }
  }
  pdu[1] = static_cast<std::uint8_t>(pdu.size() - 2);
  return framed(frame, pdu);
}

}  // namespace lostwork
