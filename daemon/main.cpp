// The program: finds the command and leaves the rest to it.
#include "daemon/check.h"
#include "daemon/demo.h"
#include "daemon/props.h"
#include "daemon/replay.h"
#include "daemon/run.h"
#include "daemon/version.h"

#include <algorithm>
#include <array>
#include <exception>
#include <iostream>
#include <span>
#include <string_view>
#include <vector>

namespace lostwork {
namespace {

using Command = int (*)(std::span<const std::string_view>, std::ostream&, std::ostream&);

struct CommandEntry {
  std::string_view name;
  std::string_view purpose;
  Command function;
};

constexpr std::array commands{
    CommandEntry{  "demo",           "the whole program against a simulated plant",   demo_command},
    CommandEntry{   "run",                 "monitors the machines of a plant file",    run_command},
    CommandEntry{ "check",      "checks a plant file; says what its sensors allow",  check_command},
    CommandEntry{"replay",  "runs a recorded history through the same computation", replay_command},
    CommandEntry{ "props", "refrigerant properties for a point or a CSV of points",  props_command},
};

void print_help(std::ostream& out) {
  out << "lostwork " << version
      << ": where the input power of heat pumps and chillers goes, and whether they are well.\n\n"
         "usage: lostwork COMMAND [options]\n\n";
  for (const CommandEntry& entry : commands) {
    out << "  " << entry.name << std::string(10 - entry.name.size(), ' ') << entry.purpose << '\n';
  }
  out << "\nlostwork COMMAND --help tells more. Exit codes: 0 done, 1 the thing asked about is "
         "not\n"
         "well, 2 bad usage or input.\n"
         "A monitor, not a protective device: it never writes to a plant. Local codes, the "
         "machines'\n"
         "own safety devices and licensed practice come first.\n";
}

int dispatch(std::span<const std::string_view> arguments) {
  if (arguments.empty()) {
    print_help(std::cerr);
    return 2;
  }
  if (arguments[0] == "--help") {
    print_help(std::cout);
    return 0;
  }
  if (arguments[0] == "--version") {
    std::cout << "lostwork " << version << '\n';
    return 0;
  }
  const auto* const entry =
      std::find_if(commands.begin(), commands.end(),
                   [&arguments](const CommandEntry& e) { return e.name == arguments[0]; });
  if (entry == commands.end()) {
    std::cerr << "lostwork: " << arguments[0] << ": no such command; see lostwork --help\n";
    return 2;
  }
  return entry->function(arguments.subspan(1), std::cout, std::cerr);
}

}  // namespace
}  // namespace lostwork

int main(int count, char** values) {
  try {
    std::ios::sync_with_stdio(false);
    const std::vector<std::string_view> arguments(values + 1, values + count);
    return lostwork::dispatch(arguments);
  } catch (const std::exception& error) {
    std::cerr << "lostwork: " << error.what() << '\n';
    return 2;
  }
}
