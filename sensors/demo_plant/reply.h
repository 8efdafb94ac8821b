// What a Modbus TCP device answers to one request frame. Pure.
//
// It can read: function codes 1 to 4. Everything else, every write among them, is refused with
// exception 1 and changes nothing, for there is nothing here that could be written.
// Source: MODBUS Application Protocol V1.1b3, 6.1 to 6.4 and 7; MODBUS Messaging on TCP/IP
// Implementation Guide V1.0b, 3.1.3.
#pragma once

#include "sensors/demo_plant/registers.h"

#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace lostwork {

// Length of the first whole frame in what has come so far; 0: not all there yet; nothing: this is
// not Modbus TCP, and the connection is to be closed.
[[nodiscard]] std::optional<std::size_t> frame_length(std::span<const std::uint8_t> received);

// `frame` is whole. Empty: no answer, the device is silent or unknown.
[[nodiscard]] std::vector<std::uint8_t> reply(const RegisterImage& image,
                                              std::span<const std::uint8_t> frame);

}  // namespace lostwork
