#include "daemon/web/acknowledge_question.h"

#include "daemon/web/utf8.h"

#include <algorithm>

#include <boost/json.hpp>

namespace lostwork {
namespace {

namespace json = boost::json;

tl::unexpected<Answer> refused(std::string_view detail) {
  return tl::unexpected<Answer>{problem(400, detail)};
}

bool is_plain(std::string_view text) {
  return is_valid_utf8(text) && std::none_of(text.begin(), text.end(), [](char c) {
           const auto byte = static_cast<unsigned char>(c);
           return (byte < 0x20 && c != '\n' && c != '\r' && c != '\t') || byte == 0x7F;
         });
}

}  // namespace

tl::expected<std::string, Answer> comment_of(std::string_view body) {
  json::error_code error;
  json::parse_options strict;
  strict.max_depth = 2;  // an object with plain members: more is refused early
  const json::value parsed = json::parse({body.data(), body.size()}, error, {}, strict);
  const json::object* members = error ? nullptr : parsed.if_object();
  if (members == nullptr) {
    return refused("The body must be a JSON object.");
  }
  for (const auto& member : *members) {
    if (member.key() != "comment") {
      return refused("The body has the member " +
                     shown_value({member.key().data(), member.key().size()}) +
                     "; only comment is known.");
    }
  }
  const json::value* comment = members->if_contains("comment");
  if (comment == nullptr) {
    return std::string{};
  }
  if (!comment->is_string()) {
    return refused("The member comment must be a text.");
  }
  const json::string& text = comment->get_string();
  if (text.size() > most_comment_bytes || !is_plain({text.data(), text.size()})) {
    return refused("The member comment must be plain text of at most 500 bytes.");
  }
  return std::string{text.data(), text.size()};
}

}  // namespace lostwork
