// Any bytes as a request: method, target, origin and content type on a line each, then the body.
// The router must answer something, and never end a head early.
#include "daemon/web/router.h"

#include <chrono>
#include <cstddef>
#include <cstdint>
#include <cstdlib>
#include <string_view>
#include <variant>

namespace {

std::string_view line(std::string_view& rest) {
  const std::size_t end = rest.find('\n');
  const std::string_view taken = rest.substr(0, end);
  rest.remove_prefix(end == std::string_view::npos ? rest.size() : end + 1);
  return taken;
}

lostwork::PlantView small_plant() {
  lostwork::PlantView view;
  view.machines.emplace_back().id = "chiller-1";
  return view;
}

}  // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  using lostwork::Answer;
  static const lostwork::PlantView view = small_plant();
  static lostwork::Router router{view,
                                 [](lostwork::Instant /*time*/) { return std::chrono::seconds{0}; },
                                 lostwork::allowed_hosts("127.0.0.1", 8470)};
  std::string_view rest{reinterpret_cast<const char*>(data), size};  // NOLINT: bytes are characters
  lostwork::Request request{};
  request.host = "127.0.0.1:8470";
  request.method = line(rest);
  request.target = line(rest);
  request.origin = line(rest);
  request.content_type = line(rest);
  request.body = rest;
  const lostwork::Action action = router.route(request);
  if (const auto* answer = std::get_if<Answer>(&action)) {
    const std::string head = head_of(*answer, lostwork::AfterAnswer::close);
    if (head.find("\r\n\r\n") != head.size() - 4 || answer->status < 200) {
      std::abort();
    }
  }
  return 0;
}
