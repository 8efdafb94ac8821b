// Lines for the journal, on standard error.
//
// A lasting fault is told once, and then at most once a minute. One thread.
#pragma once

#include <chrono>
#include <map>
#include <ostream>
#include <string>
#include <string_view>

namespace lostwork {

// The levels of syslog (RFC 5424) that are used here.
enum class Severity { error = 3, warning = 4, notice = 5, info = 6 };

class Log {
 public:
  // with_levels: each line begins with "<4>", which journald takes for its level.
  Log(std::ostream& out, bool with_levels) : out_{out}, with_levels_{with_levels} {}

  void line(Severity severity, std::string_view text);
  // `key` names the fault: within a minute after a line further ones are only counted.
  void fault(std::string_view key, std::string_view text,
             std::chrono::steady_clock::time_point now);

 private:
  struct Told {
    std::chrono::steady_clock::time_point at;
    unsigned unsaid = 0;
  };

  std::ostream& out_;
  bool with_levels_;
  std::map<std::string, Told, std::less<>> told_;
};

}  // namespace lostwork
