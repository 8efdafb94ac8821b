#include "sensors/demo_plant/fault.h"

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <limits>
#include <map>

namespace lostwork {
namespace {

using Fields = std::map<std::string_view, std::string_view>;
using Days = std::chrono::duration<double, std::chrono::days::period>;

enum class Target : std::uint8_t { machine, sensor, device };

// How a kind is ordered: one row each, in the order of FaultKind.
struct Form {
  std::string_view name;
  Target target;
  std::string_view size_key;  // empty: the kind has no size
  double min;
  double max;
  double per_unit;  // what one unit of the text is inside
  bool may_have_goal;
};

constexpr auto forms = std::to_array<Form>({
    { "condenser_fouling", Target::machine, "rate",  1e-6, 1000.0, 0.01,  true},
    {"low_condenser_flow", Target::machine, "loss",   0.1,   90.0, 0.01, false},
    {  "refrigerant_leak", Target::machine, "rate",  1e-6,  100.0, 0.01, false},
    {   "compressor_wear", Target::machine, "rate",  1e-6,  100.0, 0.01,  true},
    {      "sensor_drift",  Target::sensor, "rate", -10.0,   10.0,  1.0, false},
    {     "sensor_broken",  Target::sensor,     "",   0.0,    0.0,  0.0, false},
    {     "device_silent",  Target::device,     "",   0.0,    0.0,  0.0, false},
});
static_assert(forms.size() == static_cast<std::size_t>(FaultKind::count));

constexpr std::string_view target_key(Target target) {
  switch (target) {
    case Target::machine: return "machine";
    case Target::sensor: return "sensor";
    case Target::device: return "device";
  }
  return "machine";
}

std::span<const std::string_view> allowed(Target target, const FaultTargets& targets) {
  switch (target) {
    case Target::machine: return targets.machines;
    case Target::sensor: return targets.sensors;
    case Target::device: return targets.devices;
  }
  return targets.machines;
}

std::string listed(std::span<const std::string_view> names) {
  std::string text;
  for (const std::string_view name : names) {
    text += text.empty() ? "" : ", ";
    text += name;
  }
  return text;
}

std::string_view trimmed(std::string_view text) {
  constexpr std::string_view blank = " \t\r";
  const auto first = text.find_first_not_of(blank);
  if (first == std::string_view::npos) {
    return {};
  }
  return text.substr(first, text.find_last_not_of(blank) - first + 1);
}

[[noreturn]] void refuse(std::string_view place, std::string_view found, std::string_view allowed) {
  throw BadFault{"fault: " + std::string{place} + " is \"" + std::string{found} +
                 "\"; allowed: " + std::string{allowed}};
}

std::string short_number(double value) {
  std::array<char, 32> text{};
  char* const end = std::to_chars(text.data(), text.data() + text.size(), value).ptr;
  return {text.data(), end};
}

struct Range {
  double min;
  double max;
};

double number(std::string_view key, std::string_view text, const Range& range) {
  double value = std::numeric_limits<double>::quiet_NaN();
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error != std::errc{} || end != text.data() + text.size() ||
      !(value >= range.min && value <= range.max)) {
    refuse(key, text,
           "a number from " + short_number(range.min) + " to " + short_number(range.max));
  }
  return value;
}

// Takes `count` digits off the front of the text; -1 where they are not there.
int digits(std::string_view& text, std::size_t count) {
  int value = -1;
  if (text.size() < count) {
    return -1;
  }
  const auto [end, error] = std::from_chars(text.data(), text.data() + count, value);
  if (error != std::errc{} || end != text.data() + count || value < 0) {
    return -1;
  }
  text.remove_prefix(count);
  return value;
}

bool take(std::string_view& text, char expected) {
  if (!text.starts_with(expected)) {
    return false;
  }
  text.remove_prefix(1);
  return true;
}

// "T06:30" or "T06:30:15"; nothing where the text is not that.
std::optional<std::chrono::seconds> time_of_day(std::string_view& text) {
  if (text.empty()) {
    return std::chrono::seconds{0};
  }
  if (!take(text, 'T')) {
    return std::nullopt;
  }
  const int hour = digits(text, 2);
  const bool colon = take(text, ':');
  const int minute = digits(text, 2);
  const int second = take(text, ':') ? digits(text, 2) : 0;
  if (!colon || hour < 0 || hour > 23 || minute < 0 || minute > 59 || second < 0 || second > 59) {
    return std::nullopt;
  }
  return std::chrono::hours{hour} + std::chrono::minutes{minute} + std::chrono::seconds{second};
}

Instant instant(std::string_view key, const std::string_view text) {
  std::string_view rest = text;
  if (rest.ends_with('Z')) {
    rest.remove_suffix(1);
  }
  const int year = digits(rest, 4);
  const bool dash = take(rest, '-');
  const int month = digits(rest, 2);
  const bool dash_again = take(rest, '-');
  const int day = digits(rest, 2);
  const std::chrono::year_month_day date{std::chrono::year{year},
                                         std::chrono::month{static_cast<unsigned>(month)},
                                         std::chrono::day{static_cast<unsigned>(day)}};
  const auto clock = time_of_day(rest);
  if (year < 0 || !dash || !dash_again || !date.ok() || !clock || !rest.empty()) {
    refuse(key, text, "a date in UTC such as 2026-03-01 or 2026-03-01T06:30");
  }
  return std::chrono::sys_days{date} + *clock;
}

Fields fields(std::string_view text) {
  Fields found;
  while (!text.empty()) {
    const auto comma = text.find(',');
    const std::string_view field = trimmed(text.substr(0, comma));
    text = comma == std::string_view::npos ? std::string_view{} : text.substr(comma + 1);
    const auto equals = field.find('=');
    if (equals == std::string_view::npos) {
      refuse("a part", field, "KEY=VALUE, parts separated by commas");
    }
    const std::string_view key = trimmed(field.substr(0, equals));
    if (!found.emplace(key, trimmed(field.substr(equals + 1))).second) {
      refuse("a key given twice", key, "each key once");
    }
  }
  return found;
}

std::vector<std::string_view> keys(const Form& form) {
  std::vector<std::string_view> known{target_key(form.target), "from", "to"};
  if (!form.size_key.empty()) {
    known.push_back(form.size_key);
  }
  if (form.size_key == "rate") {
    known.emplace_back("limit");
  }
  if (form.may_have_goal) {
    known.insert(known.end(), {"power", "days"});
  }
  return known;
}

std::string_view needed(const Form& form, const Fields& found, std::string_view key) {
  const auto field = found.find(key);
  if (field == found.end()) {
    refuse(std::string{form.name} + " without " + std::string{key} + "=", listed(keys(form)),
           "these keys, and " + std::string{key} + "= is needed");
  }
  return field->second;
}

void read_size(const Form& form, const Fields& found, PlantFault& fault) {
  if (form.size_key.empty()) {
    return;
  }
  if (form.may_have_goal && (found.contains("power") || found.contains("days"))) {
    if (found.contains(form.size_key) || found.contains("limit")) {
      refuse(form.name, "power= or days= together with rate= or limit=", "one pair or the other");
    }
    const double percent = number("power", needed(form, found, "power"), {0.1, 30.0});
    const Days days{number("days", needed(form, found, "days"), {0.01, 3650.0})};
    fault.goal = PowerGoal{.extra_power = percent / 100.0, .after = std::chrono::round<Span>(days)};
    return;
  }
  fault.size = form.per_unit *
               number(form.size_key, needed(form, found, form.size_key), {form.min, form.max});
  if (const auto limit = found.find("limit"); limit != found.end()) {
    fault.limit = form.per_unit * number("limit", limit->second, {1e-6, 1000.0});
  }
}

const Form& form_named(std::string_view name) {
  const auto* form =
      std::find_if(forms.begin(), forms.end(), [name](const Form& f) { return f.name == name; });
  if (form == forms.end()) {
    std::vector<std::string_view> names;
    names.reserve(forms.size());
    for (const Form& f : forms) {
      names.push_back(f.name);
    }
    refuse("the kind", name, listed(names));
  }
  return *form;
}

void check_keys(const Form& form, const Fields& found) {
  const auto known = keys(form);
  for (const auto& [key, value] : found) {
    if (std::find(known.begin(), known.end(), key) == known.end()) {
      refuse("a key of " + std::string{form.name}, key, listed(known));
    }
  }
}

}  // namespace

std::string_view name(FaultKind kind) {
  return forms.at(static_cast<std::size_t>(kind)).name;
}

double PlantFault::extent(Instant time) const {
  if (time < from || (to && time >= *to)) {
    return 0.0;
  }
  if (kind == FaultKind::low_condenser_flow) {
    return size;
  }
  if (kind == FaultKind::sensor_broken || kind == FaultKind::device_silent) {
    return 1.0;
  }
  const double grown = size * std::chrono::duration_cast<Days>(time - from).count();
  const double most = limit.value_or(std::numeric_limits<double>::infinity());
  return std::clamp(grown, -most, most);
}

PlantFault parse_fault(std::string_view text, const FaultTargets& targets) {
  const auto colon = text.find(':');
  const Form& form = form_named(trimmed(text.substr(0, colon)));
  const Fields found =
      fields(colon == std::string_view::npos ? std::string_view{} : text.substr(colon + 1));
  check_keys(form, found);
  PlantFault fault;
  fault.kind = static_cast<FaultKind>(&form - forms.data());
  const std::string_view target = needed(form, found, target_key(form.target));
  const auto names = allowed(form.target, targets);
  if (std::find(names.begin(), names.end(), target) == names.end()) {
    refuse(target_key(form.target), target, listed(names));
  }
  fault.target = target;
  fault.from = instant("from", needed(form, found, "from"));
  if (found.contains("to") || fault.kind == FaultKind::device_silent) {
    const std::string_view to = needed(form, found, "to");
    fault.to = instant("to", to);
    if (*fault.to <= fault.from) {
      refuse("to", to, "a date after from=");
    }
  }
  read_size(form, found, fault);
  return fault;
}

std::vector<PlantFault> parse_fault_script(std::string_view text, const FaultTargets& targets,
                                           std::string_view place) {
  std::vector<PlantFault> faults;
  for (int line_number = 1; !text.empty(); ++line_number) {
    const auto end = text.find('\n');
    const std::string_view whole = text.substr(0, end);
    text = end == std::string_view::npos ? std::string_view{} : text.substr(end + 1);
    const std::string_view line = trimmed(whole.substr(0, whole.find('#')));
    if (line.empty()) {
      continue;
    }
    try {
      faults.push_back(parse_fault(line, targets));
    } catch (const BadFault& bad) {
      throw BadFault{std::string{place} + ":" + std::to_string(line_number) + ": " + bad.what()};
    }
  }
  return faults;
}

}  // namespace lostwork
