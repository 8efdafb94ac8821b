// An answer to a request, and its head as bytes. Pure.
#pragma once

#include <memory>
#include <string>
#include <string_view>

namespace lostwork {

struct Answer {
  int status = 200;
  std::string_view content_type = "application/json";  // a literal
  // Either shared with other answers of the same moment, or a literal of the program.
  std::shared_ptr<const std::string> owner;
  std::string_view body;
  std::string_view cache_control = "no-store";
  std::string_view allow;        // the methods that there are, in a 405
  std::string_view retry_after;  // seconds, in a 503
};

[[nodiscard]] Answer text_answer(std::string_view content_type, std::string body);
[[nodiscard]] Answer shared_answer(std::string_view content_type,
                                   std::shared_ptr<const std::string> body);

// RFC 9457 problem details. `detail` is one sentence for whoever asked; it names no path, no
// version and no inside of the program.
[[nodiscard]] Answer problem(int status, std::string_view detail);

// What a rejected value is called in a detail: in quotes, at most 60 bytes of it.
[[nodiscard]] std::string shown_value(std::string_view value);

enum class AfterAnswer : bool { close, keep_alive };
// Status line and header fields with the blank line. Every answer carries the security fields.
[[nodiscard]] std::string head_of(const Answer& answer, AfterAnswer after);
// The same for an event stream, whose length is not known.
[[nodiscard]] std::string event_stream_head();

}  // namespace lostwork
