#include "storage/rows.h"

#include <algorithm>

namespace lostwork {

bool Batch::due(Span window) const {
  if (!alarms.empty()) {
    return true;
  }
  if (scans.empty()) {
    return false;
  }
  const auto [oldest, newest] = std::minmax_element(
      scans.begin(), scans.end(),
      [](const ScanRow& a, const ScanRow& b) { return a.scan.time < b.scan.time; });
  return newest->scan.time - oldest->scan.time >= window;
}

}  // namespace lostwork
