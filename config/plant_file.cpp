#include "config/plant_file.h"

#include "config/plant_keys.h"
#include "config/toml_reader.h"

namespace lostwork {
namespace {

constexpr std::string_view accuracy_form =
    "one or several of { class = \"Pt100 A\" }, { limit = X }, { percent_of_reading = X }, "
    "{ percent_of_span = X, span = [a, b] }, { u = X } with X >= 0";

std::optional<std::array<double, 2>> two_numbers(const toml::node& node) {
  const toml::array* array = node.as_array();
  if (array == nullptr || array->size() != 2 || !(*array)[0].is_number() ||
      !(*array)[1].is_number()) {
    return std::nullopt;
  }
  const std::array out{*(*array)[0].value<double>(), *(*array)[1].value<double>()};
  if (!std::isfinite(out[0]) || !std::isfinite(out[1]) || !(out[0] < out[1])) {
    return std::nullopt;
  }
  return out;
}

bool take_accuracy_part(const std::string& name, const toml::node& node, AccuracyEntry& out) {
  if (name == "class") {
    out.sensor_class = node.value<std::string>();
    return out.sensor_class.has_value();
  }
  if (name == "span") {
    out.span = two_numbers(node);
    return out.span.has_value();
  }
  const auto number = node.is_number() ? node.value<double>() : std::nullopt;
  if (!number || !(*number >= 0.0) || !std::isfinite(*number)) {
    return false;
  }
  if (name == "limit") {
    out.limit = number;
  } else if (name == "percent_of_reading") {
    out.percent_of_reading = number;
  } else if (name == "percent_of_span") {
    out.percent_of_span = number;
  } else if (name == "u") {
    out.u = number;
  } else {
    return false;
  }
  return true;
}

std::optional<AccuracyEntry> one_accuracy(const toml::table& table) {
  AccuracyEntry out;
  for (const auto& [name, node] : table) {
    if (!take_accuracy_part(std::string{name.str()}, node, out)) {
      return std::nullopt;
    }
  }
  const bool span_fits = out.span.has_value() == out.percent_of_span.has_value();
  return table.empty() || !span_fits ? std::nullopt : std::optional{out};
}

std::vector<AccuracyEntry> take_accuracy(const TomlPlace& place, std::string_view key) {
  const toml::node* node = node_of(place.table, key);
  if (node == nullptr) {
    return {};
  }
  std::vector<AccuracyEntry> out;
  const auto add = [&out](const toml::node& part) {
    const auto one = part.is_table() ? one_accuracy(*part.as_table()) : std::nullopt;
    if (one) {
      out.push_back(*one);
    }
    return one.has_value();
  };
  bool good = true;
  if (const toml::array* array = node->as_array()) {
    for (const toml::node& part : *array) {
      good = add(part) && good;
    }
    good = good && !array->empty();
  } else {
    good = add(*node);
  }
  if (!good) {
    place.refuse(*node, key, std::string{accuracy_form});
  }
  return out;
}

StreamEntry take_stream(const TomlPlace& place, std::string_view key) {
  StreamEntry out;
  const toml::node* node = node_of(place.table, key);
  if (node == nullptr) {
    return out;
  }
  static constexpr std::array stream_keys{
      Key<StreamEntry>{       "fluid",        &StreamEntry::fluid,               "the liquid"},
      Key<StreamEntry>{ "rho_cp_J_m3K", &StreamEntry::rho_cp_J_m3K, "volumetric heat capacity",                                                       false, 1e5, 1e7},
  };
  if (const toml::table* table = node->as_table()) {
    EntryPlace inner{.line = table->source().begin.line,
                     .name = place.entry.name + '.' + std::string{key}};
    out = read_by_keys<StreamEntry>({*table, inner, place.problems}, stream_keys);
    out.place = std::move(inner);
    return out;
  }
  place.refuse(*node, key, std::string{keys::stream_form});
  return out;
}

CasingLossEntry take_casing_loss(const TomlPlace& place) {
  static constexpr std::array casing_keys{
      Key<CasingLossEntry>{"fraction", &CasingLossEntry::fraction,    "share of the power", true, 0,
                           0.5                                                                          },
      Key<CasingLossEntry>{   "limit",    &CasingLossEntry::limit, "how far off it may be", true, 0, 0.5},
  };
  const toml::node* node = node_of(place.table, "casing_loss");
  if (node == nullptr) {
    return {};
  }
  if (const toml::table* table = node->as_table()) {
    EntryPlace inner{.name = place.entry.name + ".casing_loss"};
    return read_by_keys<CasingLossEntry>({*table, inner, place.problems}, casing_keys);
  }
  place.refuse(*node, "casing_loss", "{ fraction = 0.05, limit = 0.05 }");
  return {};
}

std::vector<std::variant<std::int64_t, double>> numbers_of(const toml::array& array) {
  std::vector<std::variant<std::int64_t, double>> out;
  for (const toml::node& part : array) {
    if (const auto* whole = part.as_integer()) {
      out.emplace_back(whole->get());
    } else if (const auto* number = part.as_floating_point()) {
      out.emplace_back(number->get());
    }
  }
  return out;
}

std::vector<std::variant<std::int64_t, double>> take_sentinels(const TomlPlace& place) {
  const toml::node* node = node_of(place.table, "sentinels");
  if (node == nullptr) {
    return {};
  }
  std::vector<std::variant<std::int64_t, double>> out;
  if (const toml::array* array = node->as_array()) {
    out = numbers_of(*array);
    if (out.size() == array->size()) {
      return out;
    }
  }
  place.refuse(*node, "sentinels", "raw numbers in brackets, as in [0x8000]");
  return {};
}

std::optional<std::chrono::sys_seconds> take_date(const toml::node* node) {
  if (node == nullptr || !node->is_date()) {
    return std::nullopt;
  }
  const toml::date d = node->as_date()->get();
  const std::chrono::year_month_day day{std::chrono::year{d.year}, std::chrono::month{d.month},
                                        std::chrono::day{d.day}};
  return day.ok() ? std::optional<std::chrono::sys_seconds>{std::chrono::sys_days{day}}
                  : std::nullopt;
}

// Those of the array that are sound and later than the one before.
std::vector<CorrectionEntry> rising_corrections(const toml::array& array) {
  std::vector<CorrectionEntry> out;
  for (const toml::node& part : array) {
    const toml::table* table = part.as_table();
    const auto from = table != nullptr ? take_date(table->get("from")) : std::nullopt;
    const auto add = from && table->size() == 2 && (*table)["add"].is_number()
                         ? (*table)["add"].value<double>()
                         : std::nullopt;
    if (add && std::isfinite(*add) && (out.empty() || out.back().from < *from)) {
      out.push_back({.from = *from, .add = *add});
    }
  }
  return out;
}

std::vector<CorrectionEntry> take_corrections(const TomlPlace& place) {
  const toml::node* node = node_of(place.table, "corrections");
  if (node == nullptr) {
    return {};
  }
  std::vector<CorrectionEntry> out;
  if (const toml::array* array = node->as_array()) {
    out = rising_corrections(*array);
    if (out.size() == array->size()) {
      return out;
    }
  }
  place.refuse(*node, "corrections",
               "[{ from = 2026-03-01, add = 0.12 }, ...] in the order of their dates");
  return {};
}

std::optional<std::array<double, 2>> take_range(const TomlPlace& place) {
  const toml::node* node = node_of(place.table, "range");
  if (node == nullptr) {
    return std::nullopt;
  }
  const auto range = two_numbers(*node);
  if (!range) {
    place.refuse(*node, "range", "[lowest, highest], two numbers in the point's unit");
  }
  return range;
}

// machine "chiller-1"; machine[2] where it has no id to be called by.
std::string name_of(const toml::table& table, std::string_view kind, std::size_t number) {
  const auto id = table["id"].value<std::string>();
  return id && !id->empty() ? std::string{kind} + " \"" + *id + '"'
                            : std::string{kind} + '[' + std::to_string(number) + ']';
}

template <class S>
S read_one(const toml::table& table, std::string name, Problems& problems,
           std::span<const Key<S>> keys) {
  EntryPlace entry{.line = table.source().begin.line, .name = std::move(name)};
  const TomlPlace place{table, entry, problems};
  S out = read_by_keys<S>(place, keys);
  if constexpr (std::is_same_v<S, MachineEntry>) {
    out.casing_loss = take_casing_loss(place);
    out.cold_stream = take_stream(place, "cold_stream");
    out.hot_stream = take_stream(place, "hot_stream");
  } else if constexpr (std::is_same_v<S, PairEntry>) {
    out.difference = take_accuracy(place, "difference");
  } else if constexpr (std::is_same_v<S, PointEntry>) {
    out.accuracy = take_accuracy(place, "accuracy");
    out.sentinels = take_sentinels(place);
    out.corrections = take_corrections(place);
    out.range = take_range(place);
  }
  if constexpr (requires { out.place; }) {
    out.place = std::move(entry);
  }
  return out;
}

class FileReader {
 public:
  FileReader(const toml::table& root, EntryPlace& place, Problems& problems)
      : root_{root}, place_{place}, problems_{problems} {}

  template <class S, std::size_t n>
  S table(std::string_view name, const std::array<Key<S>, n>& keys, bool required) {
    known_.push_back(name);
    const toml::node* node = node_of(root_, name);
    if (node == nullptr) {
      if (required) {
        problems_.push_back({.line = 0,
                             .key = '[' + std::string{name} + ']',
                             .found = {},
                             .allowed = "is required"});
      }
      return {};
    }
    if (const toml::table* found = node->as_table()) {
      return read_one<S>(*found, std::string{name}, problems_, keys);
    }
    refuse(*node, name, '[' + std::string{name} + "] with its keys below it");
    return {};
  }

  template <class S, std::size_t n>
  std::vector<S> tables(std::string_view name, const std::array<Key<S>, n>& keys) {
    known_.push_back(name);
    std::vector<S> out;
    const toml::node* node = node_of(root_, name);
    if (node == nullptr) {
      return out;
    }
    const toml::array* array = node->as_array();
    if (array == nullptr || !array->is_homogeneous<toml::table>()) {
      refuse(*node, name, "[[" + std::string{name} + "]] with its keys below it, once for each");
      return out;
    }
    for (const toml::node& part : *array) {
      const toml::table& one = *part.as_table();
      out.push_back(read_one<S>(one, name_of(one, name, out.size() + 1), problems_, keys));
    }
    return out;
  }

  void refuse_unknown() {
    for (const auto& [name, node] : root_) {
      if (std::find(known_.begin(), known_.end(), name.str()) == known_.end()) {
        refuse(node, name.str(), "no such table; known:" + known_names());
      }
    }
  }

 private:
  [[nodiscard]] std::string known_names() const {
    std::string names;
    for (const std::string_view known : known_) {
      names += ' ' + std::string{known};
    }
    return names;
  }

  void refuse(const toml::node& node, std::string_view key, std::string allowed) {
    problems_.push_back({.line = line_of(node),
                         .key = std::string{key},
                         .found = found_text(node),
                         .allowed = std::move(allowed)});
    place_.refused.emplace(key);
  }

  const toml::table& root_;
  EntryPlace& place_;
  Problems& problems_;
  std::vector<std::string_view> known_;
};

PlantFile read_tables(const toml::table& root, Problems& problems) {
  PlantFile file;
  FileReader reader{root, file.place, problems};
  file.site = reader.table("site", keys::site, true);
  file.storage = reader.table("storage", keys::storage, false);
  file.web = reader.table("web", keys::web, false);
  file.tariff = reader.table("tariff", keys::tariff, false);
  file.buses = reader.tables("bus", keys::bus);
  file.devices = reader.tables("device", keys::device);
  file.machines = reader.tables("machine", keys::machine);
  file.pairs = reader.tables("pair", keys::pair);
  file.points = reader.tables("point", keys::point);
  file.safety_limits = reader.tables("safety_limit", keys::safety_limit);
  reader.refuse_unknown();
  return file;
}

}  // namespace

std::optional<PlantFile> read_plant_file(std::string_view text, std::string_view name,
                                         Problems& problems) {
  try {
    return read_tables(toml::parse(text, name), problems);
  } catch (const toml::parse_error& error) {
    problems.push_back({.line = error.source().begin.line,
                        .key = "TOML",
                        .found = {},
                        .allowed = std::string{error.description()}});
    return std::nullopt;
  }
}

}  // namespace lostwork
