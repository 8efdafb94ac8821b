#include "storage/columns.h"

#include "storage/checksum.h"

#include <algorithm>
#include <array>

namespace lostwork {
namespace {

enum Mode : unsigned { nothing = 0, equal = 1, plain = 2, dictionary = 3 };

constexpr std::size_t checksum_bytes = 4;
constexpr std::size_t most_different = 255;

unsigned log2_bytes_for(std::uint64_t largest) {
  if (largest <= 0xFFU) {
    return 0;
  }
  if (largest <= 0xFFFFU) {
    return 1;
  }
  return largest <= 0xFFFFFFFFU ? 2 : 3;
}

std::uint32_t checksum(std::int64_t key, std::span<const std::uint8_t> blob) {
  std::array<std::uint8_t, sizeof key> key_bytes{};
  std::memcpy(key_bytes.data(), &key, sizeof key);
  return crc32c(blob, crc32c(key_bytes));
}

std::uint8_t form_byte(unsigned mode, unsigned log2_bytes) {
  return static_cast<std::uint8_t>(mode + 16 * log2_bytes);
}

}  // namespace

void ColumnWriter::put_packed(std::span<const std::uint64_t> values, unsigned log2_bytes) {
  const std::size_t size = std::size_t{1} << log2_bytes;
  std::size_t at = bytes_.size();
  bytes_.resize(at + values.size() * size);
  if (size == sizeof(std::uint64_t)) {
    std::memcpy(bytes_.data() + at, values.data(), values.size_bytes());
    return;
  }
  for (const std::uint64_t value : values) {
    std::memcpy(bytes_.data() + at, &value, size);
    at += size;
  }
}

bool ColumnWriter::put_dictionary(std::span<const std::uint64_t> values, unsigned log2_bytes) {
  const std::size_t most = std::min(most_different, values.size() / 3);
  std::array<std::uint64_t, most_different> different{};
  std::vector<std::uint8_t> places(values.size());
  std::size_t count = 0;
  for (std::size_t i = 0; i < values.size(); ++i) {
    const auto* const end = different.begin() + static_cast<std::ptrdiff_t>(count);
    const auto* const place = std::find(different.cbegin(), end, values[i]);
    if (place == end && count == most) {
      return false;
    }
    if (place == end) {
      different.at(count++) = values[i];
    }
    places[i] = static_cast<std::uint8_t>(place - different.begin());
  }
  put(form_byte(dictionary, log2_bytes));
  put(static_cast<std::uint8_t>(count));
  put_packed(std::span{different}.first(count), log2_bytes);
  bytes_.insert(bytes_.end(), places.begin(), places.end());
  return true;
}

void ColumnWriter::put_column(std::span<const std::uint64_t> values, bool repetitive) {
  if (values.empty()) {
    put(form_byte(nothing, 0));
    return;
  }
  const auto [least, largest] = std::minmax_element(values.begin(), values.end());
  const unsigned log2_bytes = log2_bytes_for(*largest);
  if (*least == *largest) {
    put(form_byte(equal, log2_bytes));
    put_packed(values.first(1), log2_bytes);
    return;
  }
  if (repetitive && log2_bytes > 0 && put_dictionary(values, log2_bytes)) {
    return;
  }
  put(form_byte(plain, log2_bytes));
  put_packed(values, log2_bytes);
}

std::span<const std::uint8_t> ColumnWriter::sealed(std::int64_t key) {
  put(checksum(key, bytes_));
  return bytes_;
}

std::optional<ColumnReader> ColumnReader::unsealed(std::int64_t key,
                                                   std::span<const std::uint8_t> blob) {
  if (blob.size() < checksum_bytes) {
    return std::nullopt;
  }
  const auto content = blob.first(blob.size() - checksum_bytes);
  std::uint32_t written = 0;
  std::memcpy(&written, blob.data() + content.size(), checksum_bytes);
  if (written != checksum(key, content)) {
    return std::nullopt;
  }
  return ColumnReader{content};
}

const std::uint8_t* ColumnReader::take(std::size_t size) {
  if (size > bytes_.size()) {
    ok_ = false;
    bytes_ = {};
    return nullptr;
  }
  const std::uint8_t* from = bytes_.data();
  bytes_ = bytes_.subspan(size);
  return from;
}

std::uint64_t ColumnReader::get_number(unsigned log2_bytes) {
  std::uint64_t value = 0;
  const std::size_t size = std::size_t{1} << log2_bytes;
  if (const std::uint8_t* from = take(size)) {
    std::memcpy(&value, from, size);
  }
  return value;
}

ColumnReader::Form ColumnReader::get_form(std::size_t n) {
  const auto byte = get<std::uint8_t>();
  const Form form{.mode = byte & 15U, .log2_bytes = byte / 16U};
  if (form.mode > dictionary || form.log2_bytes > 3 || (form.mode == nothing) != (n == 0)) {
    ok_ = false;
    bytes_ = {};
    return {.mode = nothing, .log2_bytes = 0};
  }
  return form;
}

void ColumnReader::get_dictionary(unsigned log2_bytes, std::vector<std::uint64_t>& values) {
  const std::size_t count = get<std::uint8_t>();
  std::array<std::uint64_t, most_different> different{};
  for (std::size_t i = 0; i < count; ++i) {
    different.at(i) = get_number(log2_bytes);
  }
  const std::uint8_t* places = take(values.size());
  for (std::size_t i = 0; places != nullptr && i < values.size(); ++i) {
    if (places[i] >= count) {
      ok_ = false;
      return;
    }
    values[i] = different.at(places[i]);
  }
}

void ColumnReader::get_column(std::size_t n, std::vector<std::uint64_t>& values) {
  const Form form = get_form(n);
  if (form.mode == equal) {
    values.assign(n, get_number(form.log2_bytes));
    return;
  }
  values.assign(n, 0);
  if (form.mode == dictionary) {
    get_dictionary(form.log2_bytes, values);
  } else if (form.mode == plain) {
    const std::size_t size = std::size_t{1} << form.log2_bytes;
    const std::uint8_t* from = take(n * size);
    for (std::size_t i = 0; from != nullptr && i < n; ++i) {
      std::memcpy(&values[i], from + i * size, size);
    }
  }
}

void ColumnReader::skip_column(std::size_t n) {
  const Form form = get_form(n);
  const std::size_t size = std::size_t{1} << form.log2_bytes;
  std::size_t bytes = 0;
  if (form.mode == equal) {
    bytes = size;
  } else if (form.mode == plain) {
    bytes = n * size;
  } else if (form.mode == dictionary) {
    bytes = get<std::uint8_t>() * size + n;
  }
  static_cast<void>(take(bytes));
}

}  // namespace lostwork
