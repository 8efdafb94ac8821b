// Writes JSON text (RFC 8259) from left to right. Commas come by themselves; nesting is the
// caller's to keep right (asserted). Strings are escaped, and what is not valid UTF-8 in them
// becomes U+FFFD; a number that is not finite is written as null.
#pragma once

#include <concepts>
#include <cstdint>
#include <string>
#include <string_view>

namespace lostwork {

class JsonWriter {
 public:
  JsonWriter& begin_object();
  JsonWriter& end_object();
  JsonWriter& begin_array();
  JsonWriter& end_array();
  JsonWriter& key(std::string_view name);

  JsonWriter& value(std::string_view text);
  JsonWriter& value(const char* text) { return value(std::string_view{text}); }
  JsonWriter& value(double number);  // the shortest text that reads back as the same double
  JsonWriter& rounded(double number, int significant_digits);
  JsonWriter& value(bool truth);
  template <std::integral Integer>
  JsonWriter& value(Integer number) {
    return literal(std::to_string(number));
  }
  JsonWriter& null();

  template <class T>
  JsonWriter& member(std::string_view name, const T& content) {
    key(name);
    return value(content);
  }

  [[nodiscard]] std::string take() { return std::move(text_); }

 private:
  JsonWriter& literal(std::string_view text);
  void separate();

  std::string text_;
  bool first_ = true;  // nothing stands yet in the innermost object or array
};

}  // namespace lostwork
