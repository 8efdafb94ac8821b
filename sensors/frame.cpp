#include "sensors/frame.h"

#include <algorithm>
#include <cstddef>

namespace lostwork {
namespace {

constexpr std::size_t mbap_size = 7;  // transaction 2, protocol 2, length 2, unit 1
constexpr std::size_t crc_size = 2;

std::uint8_t high(std::uint16_t word) {
  return static_cast<std::uint8_t>(word >> 8U);
}
std::uint8_t low(std::uint16_t word) {
  return static_cast<std::uint8_t>(word & 0xFFU);
}
std::uint16_t word_at(std::span<const std::uint8_t> bytes, std::size_t i) {
  return static_cast<std::uint16_t>((bytes[i] << 8U) | bytes[i + 1]);
}

BlockAnswer malformed() {
  BlockAnswer answer;
  answer.failure = BusFailure::malformed;
  return answer;
}

BlockAnswer refused(std::uint8_t code) {
  BlockAnswer answer;
  answer.failure = BusFailure::exception;
  answer.exception_code = code;
  return answer;
}

std::vector<std::uint16_t> registers(std::span<const std::uint8_t> bytes) {
  std::vector<std::uint16_t> words(bytes.size() / 2);
  for (std::size_t i = 0; i < words.size(); ++i) {
    words[i] = word_at(bytes, 2 * i);
  }
  return words;
}

std::vector<std::uint16_t> bits(std::span<const std::uint8_t> bytes, std::size_t count) {
  std::vector<std::uint16_t> words(count);
  for (std::size_t i = 0; i < count; ++i) {
    words[i] = static_cast<std::uint16_t>((unsigned{bytes[i / 8]} >> (i % 8)) & 1U);
  }
  return words;
}

// pdu: from the function code to the last byte.
BlockAnswer pdu_answer(const BlockRequest& request, std::span<const std::uint8_t> pdu) {
  const std::uint8_t function = function_code(request.table);
  if (pdu.size() == 2 && pdu[0] == (function | 0x80U)) {
    return refused(pdu[1]);
  }
  const bool bitwise = holds_bits(request.table);
  const std::size_t bytes = bitwise ? (request.count + 7U) / 8U : request.count * 2U;
  if (pdu.size() != bytes + 2 || pdu[0] != function || pdu[1] != bytes) {
    return malformed();
  }
  const auto payload = pdu.subspan(2);
  BlockAnswer answer;
  answer.words = bitwise ? bits(payload, request.count) : registers(payload);
  return answer;
}

}  // namespace

std::uint8_t function_code(Table table) {
  switch (table) {
    case Table::coil: return 1;
    case Table::discrete: return 2;
    case Table::input: return 4;
    case Table::holding:
    case Table::count: break;
  }
  return 3;
}

std::array<std::uint8_t, 12> tcp_request(const BlockRequest& request, std::uint16_t transaction) {
  return {high(transaction),
          low(transaction),
          0,
          0,
          0,
          6,  // bytes that follow
          request.unit,
          function_code(request.table),
          high(request.address),
          low(request.address),
          high(request.count),
          low(request.count)};
}

std::array<std::uint8_t, 8> rtu_request(const BlockRequest& request) {
  std::array<std::uint8_t, 8> frame{request.unit,
                                    function_code(request.table),
                                    high(request.address),
                                    low(request.address),
                                    high(request.count),
                                    low(request.count),
                                    0,
                                    0};
  const std::uint16_t crc = modbus_crc(std::span{frame}.first(6));
  frame[6] = low(crc);  // low byte first
  frame[7] = high(crc);
  return frame;
}

BlockAnswer tcp_answer(const BlockRequest& request, std::uint16_t transaction,
                       std::span<const std::uint8_t> frame) {
  if (frame.size() <= mbap_size || word_at(frame, 0) != transaction || word_at(frame, 2) != 0 ||
      word_at(frame, 4) != frame.size() - (mbap_size - 1) || frame[6] != request.unit) {
    return malformed();
  }
  return pdu_answer(request, frame.subspan(mbap_size));
}

BlockAnswer rtu_answer(const BlockRequest& request, std::span<const std::uint8_t> frame) {
  if (frame.size() <= 1 + crc_size || frame[0] != request.unit) {
    return malformed();
  }
  const auto body = frame.first(frame.size() - crc_size);
  const std::uint16_t crc = modbus_crc(body);
  if (frame[body.size()] != low(crc) || frame[body.size() + 1] != high(crc)) {
    return malformed();
  }
  return pdu_answer(request, body.subspan(1));
}

std::uint16_t modbus_crc(std::span<const std::uint8_t> bytes) {
  std::uint16_t crc = 0xFFFF;
  for (const std::uint8_t byte : bytes) {
    crc = static_cast<std::uint16_t>(crc ^ byte);
    for (int bit = 0; bit < 8; ++bit) {
      const bool odd = (crc & 1U) != 0;
      crc = static_cast<std::uint16_t>((crc >> 1U) ^ (odd ? 0xA001U : 0U));
    }
  }
  return crc;
}

}  // namespace lostwork
