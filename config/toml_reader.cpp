#include "config/toml_reader.h"

#include "config/near_name.h"

#include <array>
#include <charconv>
#include <sstream>

namespace lostwork {
std::string number_text(double value) {
  std::array<char, 32> buffer{};
  const bool plain = std::abs(value) < 1e9 && (value == 0.0 || std::abs(value) > 1e-6);
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value,
                                 plain ? std::chars_format::fixed : std::chars_format::general);
  return {buffer.data(), end.ptr};
}

std::uint32_t line_of(const toml::node& node) {
  return node.source().begin.line;
}

std::string found_text(const toml::node& node) {
  std::ostringstream out;
  node.visit([&out](const auto& n) { out << n; });
  std::string text = out.str();
  constexpr std::size_t longest = 80;
  if (text.size() > longest) {
    text = text.substr(0, longest) + "...";
  }
  return text;
}

std::string allowed_number(double min, double max, bool whole) {
  std::string kind = whole ? "a whole number" : "a number";
  if (std::isfinite(min) && std::isfinite(max)) {
    return kind + " from " + number_text(min) + " to " + number_text(max);
  }
  if (std::isfinite(min)) {
    return kind + " of at least " + number_text(min);
  }
  return kind;
}

std::string allowed_choices(std::span<const std::string_view> choices) {
  std::string out = "one of";
  for (const std::string_view choice : choices) {
    out += (out == "one of" ? " \"" : ", \"") + std::string{choice} + '"';
  }
  return out;
}

const toml::node* node_of(const toml::table& table, std::string_view key) {
  if (const toml::node* node = table.get(key)) {
    return node;
  }
  for (const auto& [written, node] : table) {
    if (is_slip_of(written.str(), key)) {
      return &node;
    }
  }
  return nullptr;
}

void TomlPlace::refuse(const toml::node& node, std::string_view key, std::string allowed) const {
  problems.push_back({.line = line_of(node),
                      .key = entry.name + '.' + std::string{key},
                      .found = found_text(node),
                      .allowed = std::move(allowed)});
  entry.refused.emplace(key);
}

void TomlPlace::missing(std::string_view key, std::string allowed) const {
  problems.push_back({.line = table.source().begin.line,
                      .key = entry.name + '.' + std::string{key},
                      .found = {},
                      .allowed = "is required: " + std::move(allowed)});
  entry.refused.emplace(key);
}

void take(const TomlPlace& place, std::string_view key, const toml::node& node, std::string& out,
          std::span<const std::string_view> choices) {
  const auto* text = node.as_string();
  if (text == nullptr || text->get().empty()) {
    place.refuse(node, key,
                 choices.empty() ? "a text that is not empty" : allowed_choices(choices));
    return;
  }
  if (!choices.empty() && std::find(choices.begin(), choices.end(), text->get()) == choices.end()) {
    place.refuse(node, key, allowed_choices(choices));
    return;
  }
  out = text->get();
}

void take_number(const TomlPlace& place, std::string_view key, const toml::node& node, double& out,
                 const NumberRange& allowed) {
  const auto value = node.is_number() ? node.value<double>() : std::nullopt;
  if (!value || !(*value >= allowed.min && *value <= allowed.max) || !std::isfinite(*value)) {
    place.refuse(node, key, allowed_number(allowed.min, allowed.max, false));
    return;
  }
  out = *value;
}

void take_whole(const TomlPlace& place, std::string_view key, const toml::node& node,
                std::int64_t& out, const NumberRange& allowed) {
  const auto* value = node.as_integer();
  if (value == nullptr || !(static_cast<double>(value->get()) >= allowed.min) ||
      !(static_cast<double>(value->get()) <= allowed.max)) {
    place.refuse(node, key, allowed_number(allowed.min, allowed.max, true));
    return;
  }
  out = value->get();
}

void take(const TomlPlace& place, std::string_view key, const toml::node& node, bool& out) {
  const auto* value = node.as_boolean();
  if (value == nullptr) {
    place.refuse(node, key, "true or false");
    return;
  }
  out = value->get();
}

}  // namespace lostwork
