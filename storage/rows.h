// What the writer is given: plain values, made on the loop's thread and moved to the store's.
#pragma once

#include "storage/alarm_row.h"
#include "thermo/cycle/assessment.h"
#include "thermo/health/finding.h"
#include "thermo/measure/window.h"
#include "thermo/reading.h"

#include <cstdint>
#include <memory>
#include <string>
#include <vector>

namespace lostwork {

// Whose readings a scan holds: readings[i] is of points[i]. Made once for each machine from its
// model, and again when the plant file has changed; shared by all its scans, never altered.
struct MachineLayout {
  std::string machine;              // MachineModel::id
  std::vector<std::string> points;  // ModelPoint::id, in the order of MachineModel::points
};

// One scan of one machine with what was made of it. Identified by machine and time: the same one
// given again is stored once, and the first one stays.
struct ScanRow {
  std::shared_ptr<const MachineLayout> layout;  // never null
  Scan scan;                                    // as many readings as the layout has points
  Assessment assessment;                        // of the same time
  Span covers{};  // the time that the scan stands for (its period), > 0: turns means into energies
};

struct WindowRow {
  std::string machine;
  Window window;  // identified by machine and begin
};

// The machine's state as archived by thermo (archive.h): replaces the one stored before.
struct StateRow {
  std::string machine;        // empty: of the whole plant
  std::uint32_t version = 0;  // of the layout of `bytes`, the owner's business
  Instant time{};             // of the last scan that went into it
  std::vector<std::uint8_t> bytes;
};

// One transaction: all of it is in the file, or nothing. The states are those after the last scan
// in it, so that history and state agree after a kill.
struct Batch {
  std::vector<ScanRow> scans;
  std::vector<WindowRow> windows;
  std::vector<Finding> findings;  // new or changed ones, whole; every version is kept
  std::vector<AlarmRow> alarms;
  std::vector<StateRow> states;

  // Whether it is time to hand it over: it holds an alarm, or its scans lie `window` or more apart.
  // A window of 0: after each scan. What was not handed over is what a power cut may take.
  [[nodiscard]] bool due(Span window) const;
};

inline constexpr Span default_commit_window{60000};

}  // namespace lostwork
