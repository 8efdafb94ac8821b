#include "daemon/web/json_writer.h"

#include "daemon/web/utf8.h"

#include <array>
#include <charconv>
#include <cmath>
#include <cstdio>

namespace lostwork {
namespace {

void append_by_code(std::string& to, char c) {
  if (static_cast<unsigned char>(c) < 0x20 || c == 0x7F) {
    std::array<char, 8> code{};
    std::snprintf(code.data(), code.size(), "\\u%04x", static_cast<unsigned>(c));
    to += code.data();
  } else {
    to += c;
  }
}

void append_escaped(std::string& to, std::string_view plain) {
  for (const char c : plain) {
    switch (c) {
      case '"': to += "\\\""; break;
      case '\\': to += "\\\\"; break;
      case '\n': to += "\\n"; break;
      case '\r': to += "\\r"; break;
      case '\t': to += "\\t"; break;
      // Not needed by JSON: so that no answer is ever taken for a page.
      case '<': to += "\\u003c"; break;
      case '>': to += "\\u003e"; break;
      case '&': to += "\\u0026"; break;
      default: append_by_code(to, c);
    }
  }
}

}  // namespace

void JsonWriter::separate() {
  if (!first_) {
    text_ += ',';
  }
  first_ = false;
}

JsonWriter& JsonWriter::literal(std::string_view text) {
  separate();
  text_ += text;
  return *this;
}

JsonWriter& JsonWriter::begin_object() {
  literal("{");
  first_ = true;
  return *this;
}

JsonWriter& JsonWriter::end_object() {
  text_ += '}';
  first_ = false;
  return *this;
}

JsonWriter& JsonWriter::begin_array() {
  literal("[");
  first_ = true;
  return *this;
}

JsonWriter& JsonWriter::end_array() {
  text_ += ']';
  first_ = false;
  return *this;
}

JsonWriter& JsonWriter::key(std::string_view name) {
  value(name);
  text_ += ':';
  first_ = true;
  return *this;
}

JsonWriter& JsonWriter::value(std::string_view text) {
  separate();
  text_ += '"';
  append_escaped(text_, valid_utf8(text));
  text_ += '"';
  return *this;
}

JsonWriter& JsonWriter::value(double number) {
  if (!std::isfinite(number)) {
    return null();
  }
  std::array<char, 32> digits{};
  const auto [end, error] = std::to_chars(digits.data(), digits.data() + digits.size(), number);
  return literal({digits.data(), end});
}

JsonWriter& JsonWriter::rounded(double number, int significant_digits) {
  if (!std::isfinite(number)) {
    return null();
  }
  std::array<char, 64> digits{};
  const auto [end, error] = std::to_chars(digits.data(), digits.data() + digits.size(), number,
                                          std::chars_format::general, significant_digits);
  return literal({digits.data(), end});
}

JsonWriter& JsonWriter::value(bool truth) {
  return literal(truth ? "true" : "false");
}

JsonWriter& JsonWriter::null() {
  return literal("null");
}

}  // namespace lostwork
