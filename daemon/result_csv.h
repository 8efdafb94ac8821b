// Assessments as CSV: one row a machine and scan, the columns that design and other programs rely
// on.
#pragma once

#include "thermo/cycle/assessment.h"

#include <ostream>
#include <string>
#include <string_view>

namespace lostwork {

// `time,machine,mode,steady,level`, then NAME and NAME_u (k = 1) for every quantity in the unit of
// its name, empty where there is no value, and last `reasons`: `name:reason` joined by `;`.
// Numbers are the shortest that read back as the same double.
void write_result_header(std::ostream& out);
void write_result_row(std::ostream& out, std::string_view machine, const Assessment& assessment);

}  // namespace lostwork
