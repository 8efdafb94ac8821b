#include "tests/daemon/web/json_schema.h"

#include <algorithm>
#include <set>

namespace lostwork {
namespace {

namespace json = boost::json;
using Faults = std::vector<std::string>;

// The one pattern of openapi.json: an instant of RFC 3339 in UTC, to the second or the millisecond.
constexpr std::string_view instant_pattern =
    R"(^[0-9]{4}-[0-9]{2}-[0-9]{2}T[0-9]{2}:[0-9]{2}:[0-9]{2}(\.[0-9]{3})?Z$)";

bool is_instant(std::string_view text) {
  constexpr std::string_view to_the_second = "0000-00-00T00:00:00Z";
  constexpr std::string_view to_the_millisecond = "0000-00-00T00:00:00.000Z";
  const auto stands_for = [](char form, char c) {
    return form == '0' ? c >= '0' && c <= '9' : c == form;
  };
  const auto has = [&](std::string_view form) {
    return std::equal(form.begin(), form.end(), text.begin(), text.end(), stands_for);
  };
  return has(to_the_second) || has(to_the_millisecond);
}

class Checker {
 public:
  explicit Checker(const json::value& root) : root_{root} {}

  void check(const json::value& value, const json::value& schema, const std::string& at) {
    const json::object& rules = schema.as_object();
    if (const json::value* reference = rules.if_contains("$ref")) {
      check(value, resolved(std::string{reference->as_string()}), at);
      return;
    }
    for (const auto& rule : rules) {
      apply(value, {rule.key().data(), rule.key().size()}, rule.value(), rules, at);
    }
  }
  [[nodiscard]] const Faults& faults() const { return faults_; }

 private:
  [[nodiscard]] const json::value& resolved(std::string pointer) const {
    return root_.at_pointer(pointer.erase(0, 1));  // "#/components/..."
  }

  void fault(const std::string& at, const std::string& what) {
    faults_.push_back(at + ": " + what);
  }

  void apply(const json::value& value, const std::string& keyword, const json::value& rule,
             const json::object& rules, const std::string& at) {
    static const std::set<std::string> silent{"description", "format", "default", "required",
                                              "additionalProperties"};
    if (keyword == "type") {
      check_type(value, rule, at);
    } else if (keyword == "enum") {
      const auto& allowed = rule.as_array();
      if (std::find(allowed.begin(), allowed.end(), value) == allowed.end()) {
        fault(at, json::serialize(value) + " is not listed");
      }
    } else if (keyword == "oneOf") {
      check_one_of(value, rule.as_array(), at);
    } else if (keyword == "properties") {
      check_properties(value, rule.as_object(), rules, at);
    } else if (keyword == "items") {
      check_items(value, rule, at);
    } else if (keyword == "pattern" || keyword == "maxLength") {
      check_text(value, keyword, rule, at);
    } else if (keyword == "minimum" || keyword == "maximum") {
      check_limit(value, keyword, rule, at);
    } else if (!silent.contains(keyword)) {
      fault(at, "the schema has the unknown keyword " + keyword);
    }
    if (keyword == "additionalProperties" && !rules.contains("properties")) {
      check_properties(value, {}, rules, at);
    }
  }

  static bool is_of(const json::value& value, std::string_view type) {
    return (type == "object" && value.is_object()) || (type == "array" && value.is_array()) ||
           (type == "string" && value.is_string()) || (type == "number" && value.is_number()) ||
           (type == "boolean" && value.is_bool()) || (type == "null" && value.is_null()) ||
           (type == "integer" && (value.is_int64() || value.is_uint64()));
  }

  void check_type(const json::value& value, const json::value& rule, const std::string& at) {
    const json::array types = rule.is_array() ? rule.as_array() : json::array{rule};
    const bool any = std::any_of(types.begin(), types.end(), [&value](const json::value& type) {
      return is_of(value, std::string_view{type.as_string().data(), type.as_string().size()});
    });
    if (!any) {
      fault(at, json::serialize(value).substr(0, 80) + " is not of type " + json::serialize(rule));
    }
  }

  void check_one_of(const json::value& value, const json::array& choices, const std::string& at) {
    const auto fits = std::count_if(choices.begin(), choices.end(), [&](const json::value& choice) {
      return schema_faults(value, choice, root_).empty();
    });
    if (fits != 1) {
      fault(at,
            std::to_string(fits) + " of the choices fit " + json::serialize(value).substr(0, 80));
    }
  }

  void check_properties(const json::value& value, const json::object& properties,
                        const json::object& rules, const std::string& at) {
    if (!value.is_object()) {
      return;
    }
    for (const auto& member : value.as_object()) {
      const std::string place = at + '/' + std::string{member.key()};
      const json::value* rule = properties.if_contains(member.key());
      const json::value* other = rules.if_contains("additionalProperties");
      if (rule == nullptr && other != nullptr && other->is_object()) {
        rule = other;
      }
      if (rule != nullptr) {
        check(member.value(), *rule, place);
      } else if (other != nullptr) {
        fault(place, "is not in the schema");
      }
    }
    if (const json::value* required = rules.if_contains("required")) {
      for (const json::value& name : required->as_array()) {
        if (!value.as_object().contains(name.as_string())) {
          fault(at, "lacks " + json::serialize(name));
        }
      }
    }
  }

  void check_items(const json::value& value, const json::value& rule, const std::string& at) {
    if (!value.is_array()) {
      return;
    }
    std::size_t number = 0;
    for (const json::value& item : value.as_array()) {
      check(item, rule, at + '/' + std::to_string(number++));
    }
  }

  void check_text(const json::value& value, const std::string& keyword, const json::value& rule,
                  const std::string& at) {
    if (!value.is_string()) {
      return;
    }
    const std::string text{value.as_string()};
    if (keyword == "pattern") {
      check_pattern(text, rule, at);
    }
    if (keyword == "maxLength" && text.size() > rule.to_number<std::size_t>()) {
      fault(at, "is too long");
    }
  }

  void check_pattern(const std::string& text, const json::value& rule, const std::string& at) {
    if (rule.as_string() != instant_pattern) {
      fault(at, "the schema has the unknown pattern " + json::serialize(rule));
    } else if (!is_instant(text)) {
      fault(at, "'" + text + "' does not match");
    }
  }

  void check_limit(const json::value& value, const std::string& keyword, const json::value& rule,
                   const std::string& at) {
    if (!value.is_number()) {
      return;
    }
    const double number = value.to_number<double>();
    const double limit = rule.to_number<double>();
    if (keyword == "minimum" ? number < limit : number > limit) {
      fault(at, std::to_string(number) + " is beyond " + std::to_string(limit));
    }
  }

  const json::value& root_;
  Faults faults_;
};

}  // namespace

std::vector<std::string> schema_faults(const json::value& document, const json::value& schema,
                                       const json::value& root) {
  Checker checker{root};
  checker.check(document, schema, "");
  return checker.faults();
}

}  // namespace lostwork
