#include "sensors/decode.h"

#include "sensors/names.h"
#include "sensors/sentence.h"

#include <array>
#include <bit>
#include <cmath>
#include <cstddef>
#include <limits>

namespace lostwork {
namespace {

constexpr std::array<std::string_view, 4> table_names{"holding", "input", "coil", "discrete"};
constexpr std::array<std::string_view, 6> type_names{"bit", "u16", "s16", "u32", "s32", "f32"};
constexpr std::array<std::string_view, 4> order_names{"ABCD", "CDAB", "BADC", "DCBA"};
constexpr std::array<std::string_view, 3> notation_names{"zero_based", "one_based", "modicon"};

// A range of register numbers as documents print them; the first is address 0 on the wire.
struct Printed {
  std::int64_t first;
  std::int64_t last;
};

constexpr std::int64_t addresses = 65536;

std::vector<Printed> printed_ranges(Notation notation, Table table) {
  switch (notation) {
    case Notation::zero_based:
      return {
          {0, addresses - 1}
      };
    case Notation::one_based:
      return {
          {1, addresses}
      };
    case Notation::modicon:
    case Notation::count: break;
  }
  if (table == Table::coil) {
    return {
        {1, addresses}
    };
  }
  const std::int64_t digit = table == Table::holding ? 4 : table == Table::input ? 3 : 1;
  return {
      { .first = digit * 10000 + 1,       .last = digit * 10000 + 9999},
      {.first = digit * 100000 + 1, .last = digit * 100000 + addresses}
  };
}

std::uint16_t swapped(std::uint16_t word) {
  return static_cast<std::uint16_t>((word << 8U) | (word >> 8U));
}

// The bits in the order of their weight. words: at least word_count(spec.type).
std::uint32_t ordered(const RegisterSpec& spec, std::span<const std::uint16_t> words) {
  const bool swap_bytes = spec.order == ByteOrder::badc || spec.order == ByteOrder::dcba;
  const bool swap_words = spec.order == ByteOrder::cdab || spec.order == ByteOrder::dcba;
  const auto word = [&words, swap_bytes](std::size_t i) -> std::uint32_t {
    return swap_bytes ? swapped(words[i]) : words[i];
  };
  if (word_count(spec.type) == 1) {
    return spec.type == RawType::bit ? words[0] : word(0);
  }
  return swap_words ? (word(1) << 16U) | word(0) : (word(0) << 16U) | word(1);
}

double number(RawType type, std::uint32_t bits) {
  switch (type) {
    case RawType::s16: return static_cast<double>(static_cast<std::int16_t>(bits));
    case RawType::s32: return static_cast<double>(static_cast<std::int32_t>(bits));
    case RawType::f32: return static_cast<double>(std::bit_cast<float>(bits));
    case RawType::bit:
    case RawType::u16:
    case RawType::u32:
    case RawType::count: break;
  }
  return static_cast<double>(bits);
}

// NaN, infinity, and the denormal numbers that words in the wrong order look like (2e-41).
bool is_no_number(RawType type, std::uint32_t bits) {
  if (type != RawType::f32) {
    return false;
  }
  const int kind = std::fpclassify(std::bit_cast<float>(bits));
  return kind != FP_NORMAL && kind != FP_ZERO;
}

}  // namespace

std::string_view name(Table table) {
  return table_names.at(static_cast<std::size_t>(table));
}
std::string_view name(RawType type) {
  return type_names.at(static_cast<std::size_t>(type));
}
std::string_view name(ByteOrder order) {
  return order_names.at(static_cast<std::size_t>(order));
}
std::string_view name(Notation notation) {
  return notation_names.at(static_cast<std::size_t>(notation));
}
std::optional<Table> table_named(std::string_view name) {
  return enumerator_named<Table>(table_names, name);
}
std::optional<RawType> raw_type_named(std::string_view name) {
  return enumerator_named<RawType>(type_names, name);
}
std::optional<ByteOrder> byte_order_named(std::string_view name) {
  return enumerator_named<ByteOrder>(order_names, name);
}
std::optional<Notation> notation_named(std::string_view name) {
  return enumerator_named<Notation>(notation_names, name);
}

bool holds_bits(Table table) {
  return table == Table::coil || table == Table::discrete;
}

std::uint16_t word_count(RawType type) {
  return type == RawType::u32 || type == RawType::s32 || type == RawType::f32 ? 2 : 1;
}

bool is_integer(RawType type) {
  return type != RawType::f32 && type != RawType::bit;
}

tl::expected<std::uint16_t, std::string> wire_address(Notation notation, Table table,
                                                      std::int64_t printed) {
  std::string ranges;
  for (const Printed& range : printed_ranges(notation, table)) {
    if (printed >= range.first && printed <= range.last) {
      return static_cast<std::uint16_t>(printed - range.first);
    }
    ranges += sentence({ranges.empty() ? "" : " or ", std::to_string(range.first), " to ",
                        std::to_string(range.last)});
  }
  return tl::unexpected{sentence({"register ", std::to_string(printed), " is not in the table ",
                                  name(table), " in the notation ", name(notation), ": ", ranges})};
}

std::optional<std::string> fault_of(const RegisterSpec& spec) {
  if (holds_bits(spec.table) != (spec.type == RawType::bit)) {
    return sentence({"type ", name(spec.type), " in the table ", name(spec.table),
                     ": coil and discrete hold the type bit, holding and input all others"});
  }
  if (spec.address + word_count(spec.type) > addresses) {
    return sentence({"a value of type ", name(spec.type),
                     " at the last register, address 65535: it takes two registers"});
  }
  if (!std::isfinite(spec.scale) || spec.scale == 0.0) {
    return sentence({"scale ", std::to_string(spec.scale), ": any finite number but 0"});
  }
  if (!std::isfinite(spec.offset)) {
    return sentence({"offset ", std::to_string(spec.offset), ": any finite number"});
  }
  return std::nullopt;
}

std::optional<std::uint32_t> bit_pattern(RawType type, std::int64_t written) {
  const std::int64_t bits = type == RawType::bit ? 1 : word_count(type) * 16;
  const bool is_signed = type == RawType::s16 || type == RawType::s32;
  const std::int64_t least = is_signed ? -(std::int64_t{1} << (bits - 1)) : 0;
  const std::int64_t most = (std::int64_t{1} << bits) - 1;
  if (written < least || written > most) {
    return std::nullopt;
  }
  return static_cast<std::uint32_t>(written & most);
}

std::optional<std::uint32_t> bit_pattern(RawType type, double written) {
  if (type != RawType::f32 ||
      !(std::abs(written) <= static_cast<double>(std::numeric_limits<float>::max()))) {
    return std::nullopt;
  }
  return std::bit_cast<std::uint32_t>(static_cast<float>(written));
}

tl::expected<double, Quality> decode(const RegisterSpec& spec,
                                     std::span<const std::uint16_t> words) {
  if (words.size() < word_count(spec.type)) {
    return tl::unexpected{Quality::out_of_range};
  }
  const std::uint32_t bits = ordered(spec, words);
  for (const std::uint32_t sentinel : spec.sentinels) {
    if (bits == sentinel) {
      return tl::unexpected{Quality::sentinel};
    }
  }
  const double value = number(spec.type, bits) * spec.scale + spec.offset;
  if (is_no_number(spec.type, bits) || !std::isfinite(value)) {
    return tl::unexpected{Quality::out_of_range};
  }
  return value;
}

}  // namespace lostwork
