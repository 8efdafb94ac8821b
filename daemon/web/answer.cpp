#include "daemon/web/answer.h"

#include "daemon/web/json_writer.h"
#include "daemon/web/utf8.h"

#include <algorithm>
#include <array>

namespace lostwork {
namespace {

struct StatusWords {
  int status;
  std::string_view phrase;
};
// RFC 9110, section 15; 431 by RFC 6585.
constexpr std::array<StatusWords, 15> statuses{
    {
     {200, "OK"},
     {400, "Bad Request"},
     {403, "Forbidden"},
     {404, "Not Found"},
     {405, "Method Not Allowed"},
     {408, "Request Timeout"},
     {409, "Conflict"},
     {413, "Content Too Large"},
     {414, "URI Too Long"},
     {415, "Unsupported Media Type"},
     {421, "Misdirected Request"},
     {431, "Request Header Fields Too Large"},
     {500, "Internal Server Error"},
     {503, "Service Unavailable"},
     {505, "HTTP Version Not Supported"},
     }
};

std::string_view phrase(int status) {
  const auto* const row =
      std::find_if(statuses.begin(), statuses.end(),
                   [status](const StatusWords& s) { return s.status == status; });
  return row == statuses.end() ? "Unknown" : row->phrase;
}

// Nothing is loaded from elsewhere, nothing shows us in a frame, nothing else reads us.
constexpr std::string_view security_fields =
    "Content-Security-Policy: default-src 'self'; base-uri 'none'; form-action 'none'; "
    "frame-ancestors 'none'; object-src 'none'\r\n"
    "X-Content-Type-Options: nosniff\r\n"
    "Referrer-Policy: no-referrer\r\n"
    "Cross-Origin-Resource-Policy: same-origin\r\n"
    "Cross-Origin-Opener-Policy: same-origin\r\n";

void field(std::string& head, std::string_view name, std::string_view value) {
  head.append(name).append(": ").append(value).append("\r\n");
}

std::string status_line(int status) {
  return "HTTP/1.1 " + std::to_string(status) + ' ' + std::string{phrase(status)} + "\r\n";
}

}  // namespace

Answer shared_answer(std::string_view content_type, std::shared_ptr<const std::string> body) {
  Answer answer;
  answer.content_type = content_type;
  answer.body = *body;
  answer.owner = std::move(body);
  return answer;
}

Answer text_answer(std::string_view content_type, std::string body) {
  return shared_answer(content_type, std::make_shared<const std::string>(std::move(body)));
}

Answer problem(int status, std::string_view detail) {
  JsonWriter json;
  json.begin_object();
  json.member("type", "about:blank").member("title", phrase(status)).member("status", status);
  json.member("detail", detail).end_object();
  Answer answer = text_answer("application/problem+json", json.take());
  answer.status = status;
  return answer;
}

std::string shown_value(std::string_view value) {
  constexpr std::size_t most = 60;
  const std::string cut{value.substr(0, most)};
  return '\'' + valid_utf8(cut) + (value.size() > most ? "...'" : "'");
}

std::string head_of(const Answer& answer, AfterAnswer after) {
  std::string head = status_line(answer.status);
  head.reserve(700);
  field(head, "Content-Type", answer.content_type);
  field(head, "Content-Length", std::to_string(answer.body.size()));
  field(head, "Cache-Control", answer.cache_control);
  if (!answer.allow.empty()) {
    field(head, "Allow", answer.allow);
  }
  if (!answer.retry_after.empty()) {
    field(head, "Retry-After", answer.retry_after);
  }
  if (after == AfterAnswer::close) {
    field(head, "Connection", "close");
  }
  return head.append(security_fields).append("\r\n");
}

std::string event_stream_head() {
  std::string head = status_line(200);
  field(head, "Content-Type", "text/event-stream");
  field(head, "Cache-Control", "no-store");
  field(head, "Connection", "close");
  return head.append(security_fields).append("\r\n");
}

}  // namespace lostwork
