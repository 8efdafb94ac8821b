// The command line of one command: a table of options, from which parsing, errors and --help are
// made.
#pragma once

#include <cstddef>
#include <map>
#include <optional>
#include <ostream>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

struct Option {
  std::string_view name;     // "--config"
  std::string_view value;    // "FILE"; empty: a flag
  std::string_view meaning;  // one line
  bool required = false;
  bool repeats = false;  // may be given several times
};

struct CommandLine {
  std::string_view usage;    // "lostwork replay --config FILE --input FILE"
  std::string_view purpose;  // a sentence or two
  std::span<const Option> options;
  std::size_t most_values = 0;  // how many arguments without an option may follow
};

struct Arguments {
  bool help = false;  // asked for; nothing else was checked then
  // By option name; a flag has an empty value.
  std::multimap<std::string_view, std::string_view> given;
  std::vector<std::string_view> values;  // in their order

  [[nodiscard]] bool has(std::string_view option) const { return given.contains(option); }
  [[nodiscard]] std::optional<std::string_view> value(std::string_view option) const;
  // Of an option that repeats, in their order.
  [[nodiscard]] std::vector<std::string_view> all(std::string_view option) const;
};

// The error is one sentence: what was found, what is allowed.
[[nodiscard]] tl::expected<Arguments, std::string> parse(
    const CommandLine& command, std::span<const std::string_view> arguments);
[[nodiscard]] std::string help_text(const CommandLine& command);

// How every command begins: parses, writes help to `out` and bad usage to `err`. An exit code where
// that was all.
[[nodiscard]] tl::expected<Arguments, int> begin_command(
    const CommandLine& command, std::span<const std::string_view> arguments, std::ostream& out,
    std::ostream& err);

// A finite number within the limits, or a sentence that names the option, the value and what is
// allowed.
[[nodiscard]] tl::expected<double, std::string> number(std::string_view option,
                                                       std::string_view value, double min,
                                                       double max);

}  // namespace lostwork
