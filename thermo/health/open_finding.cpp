#include "thermo/health/open_finding.h"

#include <array>
#include <chrono>
#include <cstdio>
#include <string>
#include <utility>

namespace lostwork {
namespace {

std::string date_text(Instant time) {
  const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(time)};
  std::array<char, 16> text{};
  std::snprintf(text.data(), text.size(), "%04d%02u%02u", static_cast<int>(date.year()),
                static_cast<unsigned>(date.month()), static_cast<unsigned>(date.day()));
  return text.data();
}

}  // namespace

std::optional<std::size_t> open_of(const HealthState& state, FindingKind kind) {
  for (std::size_t i = 0; i < state.findings.size(); ++i) {
    if (state.findings[i].kind == kind) {
      return i;
    }
  }
  return std::nullopt;
}

std::size_t opened(const HealthModel& model, HealthState& state, FindingKind kind, Instant now) {
  if (const auto at = open_of(state, kind)) {
    return *at;
  }
  const Instant day = now - Span{1};
  Finding finding;
  finding.id = model.machine.id + "." + std::string{name(kind)} + "." + date_text(day);
  finding.machine = model.machine.id;
  finding.kind = kind;
  finding.state = FindingState::watch;
  finding.first_seen = now;
  finding.currency = model.tariff.currency;
  state.findings.push_back(std::move(finding));
  state.progress.emplace_back();
  return state.findings.size() - 1;
}

Finding closed(HealthState& state, std::size_t at, Instant now) {
  Finding over = std::move(state.findings[at]);
  state.findings.erase(state.findings.begin() + static_cast<std::ptrdiff_t>(at));
  state.progress.erase(state.progress.begin() + static_cast<std::ptrdiff_t>(at));
  over.state = FindingState::over;
  over.ended = now;
  over.updated = now;
  return over;
}

}  // namespace lostwork
