// Modbus read requests and their answers as bytes. Pure.
//
// A request can carry the function codes 1 to 4 alone, for it is made from a Table.
// Source: MODBUS Application Protocol V1.1b3, 6.1 to 6.4 and 7; MODBUS Messaging on TCP/IP
// Implementation Guide V1.0b, 3.1.3; MODBUS over Serial Line V1.02, 6.2.2 (CRC).
#pragma once

#include "sensors/bus.h"

#include <array>
#include <cstdint>
#include <span>

namespace lostwork {

[[nodiscard]] std::uint8_t function_code(Table table);  // 1 to 4

[[nodiscard]] std::array<std::uint8_t, 12> tcp_request(const BlockRequest& request,
                                                       std::uint16_t transaction);
[[nodiscard]] std::array<std::uint8_t, 8> rtu_request(const BlockRequest& request);

// The words, or exception or malformed, of a whole frame. TCP: transaction, protocol, length, unit,
// function, byte count must all be those of the request. RTU: unit, function, byte count and CRC.
// The time is left at its default.
[[nodiscard]] BlockAnswer tcp_answer(const BlockRequest& request, std::uint16_t transaction,
                                     std::span<const std::uint8_t> frame);
[[nodiscard]] BlockAnswer rtu_answer(const BlockRequest& request,
                                     std::span<const std::uint8_t> frame);

[[nodiscard]] std::uint16_t modbus_crc(std::span<const std::uint8_t> bytes);

}  // namespace lostwork
