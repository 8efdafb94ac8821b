// Numbers as bytes, column by column; with a checksum at the end.
//
// Pure. Little-endian. A column of n whole numbers is one byte (mode + 16 * b, 2^b bytes to a
// number, the least that holds the largest) and then
//   mode 0  nothing: n = 0
//   mode 1  one number: all are equal
//   mode 2  n numbers
//   mode 3  one byte k, k different numbers, and n bytes, each the place of one of them
// Doubles go by their bits, so that they come back exactly.
#pragma once

#include <bit>
#include <cstddef>
#include <cstdint>
#include <cstring>
#include <optional>
#include <span>
#include <vector>

namespace lostwork {

class ColumnWriter {
 public:
  template <class Whole>
  void put(Whole value) {
    static_assert(std::is_unsigned_v<Whole>);
    static_assert(std::endian::native == std::endian::little);
    const std::size_t at = bytes_.size();
    bytes_.resize(at + sizeof value);
    std::memcpy(bytes_.data() + at, &value, sizeof value);
  }
  // repetitive: worth a look whether few different numbers occur.
  void put_column(std::span<const std::uint64_t> values, bool repetitive = false);

  // The blob with its checksum, over key and blob. To be used again after clear().
  [[nodiscard]] std::span<const std::uint8_t> sealed(std::int64_t key);
  void clear() { bytes_.clear(); }

 private:
  void put_packed(std::span<const std::uint64_t> values, unsigned log2_bytes);
  [[nodiscard]] bool put_dictionary(std::span<const std::uint64_t> values, unsigned log2_bytes);
  std::vector<std::uint8_t> bytes_;
};

// Reads what ColumnWriter wrote. Past the end, or in a wrong mode, everything reads as 0 and ok()
// is false from then on.
class ColumnReader {
 public:
  // None where the checksum fails. The blob outlives the reader.
  [[nodiscard]] static std::optional<ColumnReader> unsealed(std::int64_t key,
                                                            std::span<const std::uint8_t> blob);
  template <class Whole>
  [[nodiscard]] Whole get() {
    static_assert(std::is_unsigned_v<Whole>);
    Whole value = 0;
    if (const std::uint8_t* from = take(sizeof value)) {
      std::memcpy(&value, from, sizeof value);
    }
    return value;
  }
  void get_column(std::size_t n, std::vector<std::uint64_t>& values);
  void skip_column(std::size_t n);
  [[nodiscard]] bool ok() const { return ok_; }

 private:
  explicit ColumnReader(std::span<const std::uint8_t> bytes) : bytes_{bytes} {}
  struct Form {
    unsigned mode;
    unsigned log2_bytes;
  };
  [[nodiscard]] Form get_form(std::size_t n);
  [[nodiscard]] const std::uint8_t* take(std::size_t size);  // null at the end
  [[nodiscard]] std::uint64_t get_number(unsigned log2_bytes);
  void get_dictionary(unsigned log2_bytes, std::vector<std::uint64_t>& values);

  std::span<const std::uint8_t> bytes_;
  bool ok_ = true;
};

// Small whole numbers for small ones of either sign.
[[nodiscard]] constexpr std::uint64_t zigzag(std::int64_t value) {
  return (static_cast<std::uint64_t>(value) << 1U) ^ static_cast<std::uint64_t>(value >> 63);
}
[[nodiscard]] constexpr std::int64_t unzigzag(std::uint64_t value) {
  return static_cast<std::int64_t>(value >> 1U) ^ -static_cast<std::int64_t>(value & 1U);
}

}  // namespace lostwork
