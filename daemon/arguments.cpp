#include "daemon/arguments.h"

#include <algorithm>
#include <charconv>
#include <sstream>

namespace lostwork {
namespace {

// "-10" is a value, "-x" and "--x" are options.
bool looks_like_option(std::string_view argument) {
  return argument.size() > 1 && argument[0] == '-' && (argument[1] < '0' || argument[1] > '9') &&
         argument[1] != '.';
}

std::string known_options(const CommandLine& command) {
  std::string out;
  for (const Option& option : command.options) {
    out += std::string{option.name} + ' ';
  }
  return out + "--help";
}

}  // namespace

std::optional<std::string_view> Arguments::value(std::string_view option) const {
  const auto found = given.find(option);
  return found == given.end() ? std::nullopt : std::optional{found->second};
}

std::vector<std::string_view> Arguments::all(std::string_view option) const {
  std::vector<std::string_view> out;
  const auto [first, last] = given.equal_range(option);
  for (auto at = first; at != last; ++at) {
    out.push_back(at->second);
  }
  return out;
}

tl::expected<Arguments, std::string> parse(const CommandLine& command,
                                           std::span<const std::string_view> arguments) {
  Arguments out;
  if (std::find(arguments.begin(), arguments.end(), "--help") != arguments.end()) {
    out.help = true;
    return out;
  }
  for (std::size_t i = 0; i < arguments.size(); ++i) {
    const std::string_view argument = arguments[i];
    if (!looks_like_option(argument)) {
      out.values.push_back(argument);
      continue;
    }
    const auto option = std::find_if(command.options.begin(), command.options.end(),
                                     [argument](const Option& o) { return o.name == argument; });
    if (option == command.options.end()) {
      return tl::unexpected{std::string{argument} +
                            ": no such option; known: " + known_options(command)};
    }
    if (!option->value.empty() && i + 1 == arguments.size()) {
      return tl::unexpected{std::string{argument} + ": needs a value, " +
                            std::string{option->value}};
    }
    if (!option->repeats && out.has(option->name)) {
      return tl::unexpected{std::string{argument} + ": given twice"};
    }
    out.given.emplace(option->name, option->value.empty() ? "" : arguments[++i]);
  }
  if (out.values.size() > command.most_values) {
    return tl::unexpected{std::string{out.values[command.most_values]} +
                          ": not expected here; usage: " + std::string{command.usage}};
  }
  for (const Option& option : command.options) {
    if (option.required && !out.has(option.name)) {
      return tl::unexpected{std::string{option.name} + " " + std::string{option.value} +
                            ": is required"};
    }
  }
  return out;
}

std::string help_text(const CommandLine& command) {
  std::ostringstream out;
  out << "usage: " << command.usage << "\n\n" << command.purpose << "\n\n";
  constexpr std::size_t column = 24;
  for (const Option& option : command.options) {
    std::string left = "  " + std::string{option.name};
    if (!option.value.empty()) {
      left += ' ' + std::string{option.value};
    }
    left.resize(std::max(left.size() + 2, column), ' ');
    out << left << option.meaning << (option.required ? " (required)" : "") << '\n';
  }
  out << "  --help                show this\n";
  return out.str();
}

tl::expected<Arguments, int> begin_command(const CommandLine& command,
                                           std::span<const std::string_view> arguments,
                                           std::ostream& out, std::ostream& err) {
  auto given = parse(command, arguments);
  if (!given) {
    const std::string_view program_and_command =
        command.usage.substr(0, command.usage.find(' ', command.usage.find(' ') + 1));
    err << program_and_command << ": " << given.error() << '\n';
    return tl::unexpected{2};
  }
  if (given->help) {
    out << help_text(command);
    return tl::unexpected{0};
  }
  return std::move(*given);
}

tl::expected<double, std::string> number(std::string_view option, std::string_view value,
                                         double min, double max) {
  double out = 0.0;
  const auto [end, error] = std::from_chars(value.data(), value.data() + value.size(), out);
  if (error != std::errc{} || end != value.data() + value.size() || !(out >= min && out <= max)) {
    std::ostringstream text;
    text << option << ' ' << value << ": allowed is a number from " << min << " to " << max;
    return tl::unexpected{text.str()};
  }
  return out;
}

}  // namespace lostwork
