#include "daemon/log.h"

namespace lostwork {
namespace {

constexpr std::chrono::minutes quiet{1};
constexpr std::size_t most_faults = 1000;  // keys remembered; a plant has far fewer

}  // namespace

void Log::line(Severity severity, std::string_view text) {
  if (with_levels_) {
    out_ << '<' << static_cast<int>(severity) << '>';
  }
  for (const char c : text) {
    out_ << (static_cast<unsigned char>(c) < 0x20 ? ' ' : c);  // one line stays one line
  }
  out_ << '\n' << std::flush;
}

void Log::fault(std::string_view key, std::string_view text,
                std::chrono::steady_clock::time_point now) {
  const auto told = told_.find(key);
  if (told == told_.end()) {
    if (told_.size() < most_faults) {
      told_.emplace(key, Told{.at = now});
    }
    line(Severity::warning, text);
    return;
  }
  if (now - told->second.at < quiet) {
    ++told->second.unsaid;
    return;
  }
  const std::string more =
      told->second.unsaid > 0
          ? " (and " + std::to_string(told->second.unsaid) + " times since the last line)"
          : "";
  told->second = {.at = now};
  line(Severity::warning, std::string{text} + more);
}

}  // namespace lostwork
