// From raw Modbus words to a value in the point's unit. Pure, safe from any thread.
//
// Source: MODBUS Application Protocol V1.1b3 (tables, big-endian words); IEEE 754 binary32.
#pragma once

#include "thermo/reading.h"

#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

enum class Table : std::uint8_t { holding, input, coil, discrete, count };
enum class RawType : std::uint8_t { bit, u16, s16, u32, s32, f32, count };
// Order of the bytes A (most significant) to D of a 32-bit value in two words. For 16-bit values
// badc and dcba swap the two bytes of the word.
enum class ByteOrder : std::uint8_t { abcd, cdab, badc, dcba, count };
// How the document of a device counts registers.
enum class Notation : std::uint8_t {
  zero_based,  // as on the wire
  one_based,   // register 1 is address 0 on the wire
  modicon,     // 40001 holding, 30001 input, 10001 discrete, 1 coil; six digits too (400001)
  count
};

[[nodiscard]] std::string_view name(Table table);
[[nodiscard]] std::string_view name(RawType type);
[[nodiscard]] std::string_view name(ByteOrder order);  // "ABCD"
[[nodiscard]] std::string_view name(Notation notation);
[[nodiscard]] std::optional<Table> table_named(std::string_view name);
[[nodiscard]] std::optional<RawType> raw_type_named(std::string_view name);
[[nodiscard]] std::optional<ByteOrder> byte_order_named(std::string_view name);
[[nodiscard]] std::optional<Notation> notation_named(std::string_view name);

struct RegisterSpec {
  Table table = Table::holding;
  std::uint16_t address = 0;  // on the wire: zero based
  RawType type = RawType::u16;
  ByteOrder order = ByteOrder::abcd;
  double scale = 1.0;  // value = raw * scale + offset, in the point's unit
  double offset = 0.0;
  // Bit patterns by which the device says "no value", tested before scaling, after byte order.
  std::vector<std::uint32_t> sentinels{};
};

[[nodiscard]] bool holds_bits(Table table);
[[nodiscard]] std::uint16_t word_count(RawType type);  // 1 or 2; of a bit: 1
[[nodiscard]] bool is_integer(RawType type);

// Address on the wire of the register printed as `printed` in the device's document, or a sentence
// on what is wrong ("register 50001 is no holding register: 40001 to 49999 or 400001 to 465536").
[[nodiscard]] tl::expected<std::uint16_t, std::string> wire_address(Notation notation, Table table,
                                                                    std::int64_t printed);

// What is wrong with the spec as a whole (a type that its table cannot hold, a 32-bit value past
// the last address, a scale of 0 or not finite); empty: nothing.
[[nodiscard]] std::optional<std::string> fault_of(const RegisterSpec& spec);

// The bit pattern of a sentinel as people write it: 0x8000, 65535, -3000 (two's complement), or for
// f32 a number (-9999.0) or, as an integer, its 32 bits. Empty: does not fit the type.
[[nodiscard]] std::optional<std::uint32_t> bit_pattern(RawType type, std::int64_t written);
[[nodiscard]] std::optional<std::uint32_t> bit_pattern(RawType type, double written);

// The value in the point's unit, or why there is none: sentinel, or out_of_range (NaN, infinity,
// fewer words than the type needs). Bits: one word 0 or 1 each.
[[nodiscard]] tl::expected<double, Quality> decode(const RegisterSpec& spec,
                                                   std::span<const std::uint16_t> words);

}  // namespace lostwork
