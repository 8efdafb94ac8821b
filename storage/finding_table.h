// Findings in the file: every version that health gave, whole.
#pragma once

#include "storage/database.h"
#include "thermo/health/finding.h"
#include "thermo/reading.h"

#include <optional>
#include <string_view>
#include <vector>

namespace lostwork {

// Whether every figure is finite: SQLite would keep NaN as NULL in silence.
[[nodiscard]] bool is_storable(const Finding& finding);

// In a transaction. A version that is in the file already (same id, time of update and state) is
// not added again.
void write_findings(Database& database, const std::vector<Finding>& findings);

// The newest version of each that is not over, newest onset first; of one machine or of all.
[[nodiscard]] std::vector<Finding> read_current_findings(Database& database,
                                                         std::optional<std::string_view> machine);
// The newest version of each that was updated in [from, to).
[[nodiscard]] std::vector<Finding> read_findings(Database& database, Instant from, Instant to,
                                                 std::optional<std::string_view> machine);
// Every version of one, oldest first.
[[nodiscard]] std::vector<Finding> read_finding_versions(Database& database, std::string_view id);

}  // namespace lostwork
