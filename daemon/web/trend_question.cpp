#include "daemon/web/trend_question.h"

#include "daemon/local_time.h"

#include <algorithm>
#include <array>
#include <charconv>
#include <optional>
#include <string_view>

namespace lostwork {
namespace {

using Query = std::vector<std::pair<std::string, std::string>>;
using Refused = tl::unexpected<Answer>;

constexpr std::array<std::string_view, 4> known{"quantity", "from", "to", "points"};

Refused refused(const std::string& detail) {
  return Refused{problem(400, detail)};
}

tl::expected<void, Answer> check_names(const Query& query) {
  for (auto entry = query.begin(); entry != query.end(); ++entry) {
    const std::string& name = entry->first;
    if (std::find(known.begin(), known.end(), name) == known.end()) {
      return refused("The parameter " + shown_value(name) +
                     " is not known; quantity, from, to and points are.");
    }
    if (std::any_of(query.begin(), entry,
                    [&name](const auto& earlier) { return earlier.first == name; })) {
      return refused("The parameter " + shown_value(name) + " is given twice.");
    }
  }
  return {};
}

std::optional<std::string_view> value_of(const Query& query, std::string_view name) {
  const auto entry =
      std::find_if(query.begin(), query.end(), [name](const auto& e) { return e.first == name; });
  return entry == query.end() ? std::nullopt : std::optional<std::string_view>{entry->second};
}

tl::expected<Instant, Answer> time_of(const Query& query, std::string_view name) {
  const auto text = value_of(query, name);
  const auto time = text ? instant_of(*text) : std::nullopt;
  if (!time) {
    return refused("The parameter " + std::string{name} + " is " +
                   (text ? shown_value(*text) : "missing") +
                   "; it must be a time like 2024-05-03T14:02:00Z.");
  }
  return *time;
}

tl::expected<std::size_t, Answer> points_of(const Query& query) {
  const auto text = value_of(query, "points");
  if (!text) {
    return TrendRequest{}.max_points;
  }
  std::size_t points = 0;
  const auto [end, error] = std::from_chars(text->data(), text->data() + text->size(), points);
  if (error != std::errc{} || end != text->data() + text->size() || points < 1 ||
      points > most_trend_points) {
    return refused("The parameter points is " + shown_value(*text) +
                   "; it must be a whole number from 1 to " + std::to_string(most_trend_points) +
                   '.');
  }
  return points;
}

tl::expected<Quantity, Answer> quantity_of(const Query& query) {
  const auto text = value_of(query, "quantity");
  const auto quantity = text ? quantity_named(*text) : std::nullopt;
  if (!quantity) {
    return refused("The parameter quantity is " + (text ? shown_value(*text) : "missing") +
                   "; /api/v1/quantities lists the names that there are.");
  }
  return *quantity;
}

}  // namespace

tl::expected<TrendRequest, Answer> trend_request(const Query& query) {
  if (auto names = check_names(query); !names) {
    return Refused{names.error()};
  }
  const auto quantity = quantity_of(query);
  const auto from = time_of(query, "from");
  const auto to = time_of(query, "to");
  const auto points = points_of(query);
  if (!quantity) {
    return Refused{quantity.error()};
  }
  if (!from || !to) {
    return Refused{from ? to.error() : from.error()};
  }
  if (!points) {
    return Refused{points.error()};
  }
  if (!(*from < *to) || *to - *from > most_trend_days) {
    return refused("The parameters from and to must span more than nothing and at most " +
                   std::to_string(most_trend_days.count()) + " days, from first.");
  }
  return TrendRequest{
      .machine = {}, .quantity = *quantity, .from = *from, .to = *to, .max_points = *points};
}

}  // namespace lostwork
