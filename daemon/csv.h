// Comma-separated values, read line by line (RFC 4180: quoted fields, either line end; a byte order
// mark is passed over).
#pragma once

#include <cstddef>
#include <istream>
#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

class CsvReader {
 public:
  explicit CsvReader(std::istream& in) : in_{in} {}

  // The next line that is not empty; false at the end. A quoted field ends on its line.
  [[nodiscard]] bool next();

  // Of the line read last; valid until the next call.
  [[nodiscard]] std::span<const std::string_view> fields() const { return fields_; }
  [[nodiscard]] std::size_t line() const { return line_; }  // from 1

 private:
  void split();

  std::istream& in_;
  std::string text_;
  std::vector<std::string_view> fields_;
  std::size_t line_ = 0;
};

// The text as one field: quoted where it must be.
[[nodiscard]] std::string csv_field(std::string_view text);

}  // namespace lostwork
