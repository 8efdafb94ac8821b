#include "storage/waiting.h"

#include "storage/finding_table.h"
#include "storage/key.h"
#include "storage/sample_block.h"

#include <algorithm>
#include <iterator>
#include <string_view>
#include <utility>

namespace lostwork {
namespace {

// Empty where the row can be stored.
std::string_view refusal(const ScanRow& row) {
  if (row.layout == nullptr) {
    return "a scan does not say whose it is";
  }
  if (row.scan.readings.size() != row.layout->points.size() ||
      row.layout->points.size() > most_points) {
    return "a scan has not as many readings as its machine has points, or more than 4000";
  }
  if (!storable(row.scan.time) || row.assessment.time != row.scan.time) {
    return "a scan's time lies outside the years 1970 to 2526, or is not that of its assessment";
  }
  return row.covers > Span{0} ? "" : "a scan stands for no time";
}

std::string_view refusal(const WindowRow& row) {
  return storable(row.window.begin) ? "" : "a window's time lies outside the years 1970 to 2526";
}

std::string_view refusal(const Finding& finding) {
  return is_storable(finding) ? "" : "a finding has a figure that is not finite";
}

template <class Row>
std::uint64_t take_sound(std::vector<Row>& from, std::vector<Row>& to, std::string& refused) {
  const bool all_sound =
      std::all_of(from.begin(), from.end(), [](const Row& row) { return refusal(row).empty(); });
  if (all_sound && to.empty()) {
    to = std::move(from);  // the usual case: no row is copied
    return 0;
  }
  std::uint64_t count = 0;
  to.reserve(to.size() + from.size());
  for (auto& row : from) {
    const std::string_view why = refusal(row);
    if (why.empty()) {
      to.push_back(std::move(row));
    } else {
      refused = why;
      ++count;
    }
  }
  return count;
}

template <class Row>
std::uint64_t drop_oldest(std::vector<Row>& rows, std::size_t limit) {
  const std::size_t beyond = rows.size() > limit ? rows.size() - limit : 0;
  rows.erase(rows.begin(), std::next(rows.begin(), static_cast<std::ptrdiff_t>(beyond)));
  return beyond;
}

}  // namespace

void Waiting::take(Batch batch) {
  refused_.clear();
  given_up_ += take_sound(batch.scans, scans_, refused_);
  given_up_ += take_sound(batch.windows, windows_, refused_);
  given_up_ += take_sound(batch.findings, findings_, refused_);
  std::move(batch.alarms.begin(), batch.alarms.end(), std::back_inserter(alarms_));
  for (StateRow& state : batch.states) {
    states_[state.machine] = std::move(state);
  }
}

void Waiting::give_up(const ScanRow& row, const std::string& why) {
  const Instant time = row.scan.time;
  const auto [at, first] = gaps_.try_emplace(
      row.layout->machine, Gap{.begin = time, .end = time, .scans = 0, .why = {}});
  Gap& gap = at->second;
  gap.begin = std::min(gap.begin, time);
  gap.end = std::max(gap.end, time);
  gap.why = why;
  ++gap.scans;
  ++given_up_;
}

void Waiting::shorten(const WaitingLimits& limits, const std::string& why) {
  const std::size_t beyond = scans_.size() > limits.scans ? scans_.size() - limits.scans : 0;
  for (std::size_t i = 0; i < beyond; ++i) {
    give_up(scans_[i], why);
  }
  scans_.erase(scans_.begin(), scans_.begin() + static_cast<std::ptrdiff_t>(beyond));
  given_up_ += drop_oldest(windows_, limits.rows);
  given_up_ += drop_oldest(findings_, limits.rows);
  given_up_ += drop_oldest(alarms_, limits.rows);
}

void Waiting::clear() {
  scans_.clear();
  windows_.clear();
  findings_.clear();
  alarms_.clear();
  states_.clear();
  gaps_.clear();
}

bool Waiting::empty() const {
  return scans_.empty() && windows_.empty() && findings_.empty() && alarms_.empty() &&
         states_.empty() && gaps_.empty();
}

}  // namespace lostwork
