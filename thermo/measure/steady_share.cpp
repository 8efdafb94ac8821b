#include "thermo/measure/steady_share.h"

#include <algorithm>
#include <cmath>
#include <functional>

namespace lostwork {
namespace {

constexpr std::size_t week = 7;

std::optional<std::size_t> largest(const std::vector<Span>& spans) {
  const auto most = std::max_element(spans.begin(), spans.end());
  if (most == spans.end() || *most == Span{0}) {
    return std::nullopt;
  }
  return static_cast<std::size_t>(most - spans.begin());
}

bool is_of_a_signal(UnsteadyCause cause) {
  return cause == UnsteadyCause::gap || cause == UnsteadyCause::trend ||
         cause == UnsteadyCause::scatter;
}

}  // namespace

std::string_view text(UnsteadyCause cause) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(UnsteadyCause::count)>
      texts{"nothing",
            "starts and stops",
            "more than six starts an hour",
            "the quarter of an hour after each start",
            "runs too short for ten whole minutes",
            "missing samples",
            "a signal that goes up or down",
            "a signal that hunts"};
  return texts.at(static_cast<std::size_t>(cause));
}

std::string text(const SteadyShare& share, const MachineModel& model) {
  const auto part = share.share();
  if (!part) {
    return {};
  }
  std::string out{"Steady for "};
  out.append(std::to_string(std::lround(100.0 * *part)))
      .append(" % of its running time of the last week.");
  if (share.main_cause == UnsteadyCause::none) {
    return out;
  }
  out.append(" Most of the rest was lost to ").append(text(share.main_cause));
  if (share.point && *share.point < model.points.size()) {
    out.append(" (").append(name(model.points[*share.point].role)).append(")");
  }
  return out.append(".");
}

std::optional<double> SteadyShare::share() const {
  if (run_time <= Span{0}) {
    return std::nullopt;
  }
  return static_cast<double>(steady_time.count()) / static_cast<double>(run_time.count());
}

SteadyShare steady_share(const std::vector<SteadyDay>& days) {
  SteadyShare out;
  std::vector<Span> lost(static_cast<std::size_t>(UnsteadyCause::count), Span{0});
  std::vector<Span> lost_to;
  for (const SteadyDay& day : days) {
    out.run_time += day.run_time;
    out.steady_time += day.steady_time;
    std::transform(lost.begin(), lost.end(), day.lost.begin(), lost.begin(), std::plus<>{});
    lost_to.resize(std::max(lost_to.size(), day.lost_to.size()), Span{0});
    for (std::size_t i = 0; i < day.lost_to.size(); ++i) {
      lost_to[i] += day.lost_to[i];
    }
  }
  out.main_cause = static_cast<UnsteadyCause>(largest(lost).value_or(0));
  if (is_of_a_signal(out.main_cause)) {
    out.point = largest(lost_to);
  }
  return out;
}

void count_running(std::vector<SteadyDay>& days, std::size_t points, Instant now, Span length,
                   const SteadyVerdict& verdict) {
  const auto today = std::chrono::floor<std::chrono::days>(now).time_since_epoch().count();
  if (days.empty() || days.back().day != today) {
    if (days.size() >= week) {
      days.erase(days.begin());
    }
    days.push_back({.day = today, .lost_to = std::vector<Span>(points, Span{0})});
  }
  SteadyDay& day = days.back();
  day.run_time += length;
  if (verdict.steady()) {
    day.steady_time += length;
    return;
  }
  day.lost.at(static_cast<std::size_t>(verdict.cause)) += length;
  if (verdict.point && *verdict.point < day.lost_to.size()) {
    day.lost_to[*verdict.point] += length;
  }
}

}  // namespace lostwork
