// The registers of the simulated devices, as each device would show them. Pure.
//
// Every device has its own manners: signed tenths with 0x8000 for a broken sensor, floats with the
// low word first and NaN for it, counters of 32 bits, status words. The point list of the plant
// file is in instrument.h; registers without a point (status, energy, hours, starts) are in
// registers.cpp.
#pragma once

#include "sensors/bus.h"
#include "sensors/demo_plant/instrument.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string_view>
#include <vector>

namespace lostwork {

struct DeviceImage {
  std::string_view id;
  std::uint8_t unit = 0;
  bool answers = true;
  // By Table; a bit is a word of 0 or 1. Gaps between registers read 0.
  std::array<std::vector<std::uint16_t>, static_cast<std::size_t>(Table::count)> tables;
};

struct RegisterImage {
  Instant time{};
  std::vector<DeviceImage> devices;
};

// All devices as they stand now.
[[nodiscard]] RegisterImage register_image(const Plant& plant);
// The same into an image made before, without asking for memory.
void refresh(RegisterImage& image, const Plant& plant);

// What a device answers, at the image's time. Failures: timeout (a silent or unknown unit),
// exception 2 (a register that it does not have), exception 3 (a count that the protocol does not
// allow).
[[nodiscard]] BlockAnswer answer(const RegisterImage& image, const BlockRequest& request);

struct EncodedWords {
  std::array<std::uint16_t, 2> word;
  std::size_t count;  // 1 or 2
};

// The inverse of decode(): rounded to the register's step. Without a value, or with one that does
// not fit, the spec's first sentinel; NaN where an f32 has none, 0 where an integer has none.
[[nodiscard]] EncodedWords encode(const RegisterSpec& spec, std::optional<double> value);

}  // namespace lostwork
