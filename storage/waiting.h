// What was handed over and is not in the file yet, within bounds.
//
// Pure.
#pragma once

#include "storage/rows.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <map>
#include <string>
#include <vector>

namespace lostwork {

// Scans of one machine that were given up.
struct Gap {
  Instant begin{};
  Instant end{};
  std::uint64_t scans = 0;
  std::string why;
};

struct WaitingLimits {
  std::size_t scans;
  std::size_t rows;  // of windows, findings and alarms, each
};

class Waiting {
 public:
  // Rows that can never be stored are refused: counted as given up, and the sentence says why.
  void take(Batch batch);
  // Gives up the oldest rows beyond the limits; `why` is recorded with the gap of their scans.
  void shorten(const WaitingLimits& limits, const std::string& why);
  void clear();  // all of it is in the file

  [[nodiscard]] const std::vector<ScanRow>& scans() const { return scans_; }
  [[nodiscard]] const std::vector<WindowRow>& windows() const { return windows_; }
  [[nodiscard]] const std::vector<Finding>& findings() const { return findings_; }
  [[nodiscard]] const std::vector<AlarmRow>& alarms() const { return alarms_; }
  [[nodiscard]] const std::map<std::string, StateRow>& states() const { return states_; }
  [[nodiscard]] const std::map<std::string, Gap>& gaps() const { return gaps_; }
  [[nodiscard]] bool empty() const;
  [[nodiscard]] std::uint64_t given_up() const { return given_up_; }
  [[nodiscard]] const std::string& refused() const { return refused_; }  // of the last take()

 private:
  void give_up(const ScanRow& row, const std::string& why);
  std::vector<ScanRow> scans_;
  std::vector<WindowRow> windows_;
  std::vector<Finding> findings_;
  std::vector<AlarmRow> alarms_;
  std::map<std::string, StateRow> states_;  // the newest of each machine
  std::map<std::string, Gap> gaps_;         // one a machine, until it is recorded
  std::uint64_t given_up_ = 0;
  std::string refused_;
};

}  // namespace lostwork
