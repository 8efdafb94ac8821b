// What a finding says to people. Pure; plain text, escaped by whoever shows it.
#pragma once

#include "daemon/plant_view.h"
#include "daemon/words.h"

#include <string>
#include <vector>

namespace lostwork {

// "Needs 6.1 % +/- 1.6 % (95 %) more power than it should, like for like, since 3 May (28 April to
// 6 May, 95 %)."
[[nodiscard]] std::string headline(const Finding& finding, const MachineView& machine,
                                   const WallClock& clock);
// Where the extra power goes, what it has cost, how much of the time could be compared; whole
// sentences, in this order, those that apply.
[[nodiscard]] std::vector<std::string> consequences(const Finding& finding);
// "work that the condenser destroys: 8.0 kW where 6.0 kW was expected (2.0 kW +/- 0.4 kW, 95 %)"
[[nodiscard]] std::string text(FindingKind kind, const Evidence& evidence);
// "the condenser is fouled", "the sensor 'cold water leaving' reads 0.48 K +/- 0.05 K (95 %) too
// high"; a flow in per cent of its present reading where there is one.
[[nodiscard]] std::string text(const RankedCause& cause, const MachineView& machine);
// The same by itself: the streams are water, and a flow is in kg/s.
[[nodiscard]] std::string cause_text(const RankedCause& cause);
// What must be kept in mind before anyone acts on it; never empty.
[[nodiscard]] std::vector<std::string> cautions(const Finding& finding);

}  // namespace lostwork
