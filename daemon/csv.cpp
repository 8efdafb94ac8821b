#include "daemon/csv.h"

namespace lostwork {
namespace {

// Takes one field off the front of `rest` (which is not yet at its end), quotes removed in place.
std::string_view take_field(char*& at, const char* end) {
  if (at == end || *at != '"') {
    char* begin = at;
    while (at != end && *at != ',') {
      ++at;
    }
    return {begin, static_cast<std::size_t>(at - begin)};
  }
  char* begin = ++at;
  char* to = begin;
  while (at != end && (*at != '"' || (at + 1 != end && at[1] == '"'))) {
    at += *at == '"' ? 1 : 0;  // a doubled quote stands for one
    *to++ = *at++;
  }
  while (at != end && *at != ',') {
    ++at;
  }
  return {begin, static_cast<std::size_t>(to - begin)};
}

}  // namespace

bool CsvReader::next() {
  while (std::getline(in_, text_)) {
    ++line_;
    constexpr std::string_view mark = "\xEF\xBB\xBF";
    if (line_ == 1 && text_.starts_with(mark)) {
      text_.erase(0, mark.size());
    }
    if (!text_.empty() && text_.back() == '\r') {
      text_.pop_back();
    }
    if (!text_.empty()) {
      split();
      return true;
    }
  }
  return false;
}

void CsvReader::split() {
  fields_.clear();
  char* at = text_.data();
  char* const end = at + text_.size();
  for (;;) {
    fields_.push_back(take_field(at, end));
    if (at == end) {
      return;
    }
    ++at;  // the comma
  }
}

std::string csv_field(std::string_view text) {
  if (text.find_first_of(",\"\r\n") == std::string_view::npos) {
    return std::string{text};
  }
  std::string out = "\"";
  for (const char c : text) {
    out += c;
    if (c == '"') {
      out += c;
    }
  }
  return out + '"';
}

}  // namespace lostwork
