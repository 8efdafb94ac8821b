// The second-law ledger of a single-stage machine between two liquid streams.
//
//   power = reversible + lost work of the components + casing + unaccounted
//
// Signs: power and cold heat go in, hot heat and casing heat go out, all > 0 in normal use; entropy
// generated is >= 0 by nature, and a negative figure is reported, never clipped.
// The reference temperature T0 is the hot mean for cooling and the cold mean for heating, so that
// the stream that only carries heat away drops out of the ledger.
//
// Refrigerant flow m, in this order, chosen by which points the machine has and never changed by a
// bad reading: from the product meter, from the other stream's meter, from the power balance with
// the stated casing loss. A product meter that is not usable passes its reason on.
// Where both streams are metered, m = w m_product + (1 - w) m_other, with the constant weight that
// makes u(m) least, correlation included, kept within 0..1; the product meter alone (w = 1) where
// no uncertainty is stated, and for as long as the other meter or its refrigerant states are not
// usable: a figure that only makes m surer does not cost the components when it is missing.
//
// The components' lines and the casing heat use the heats of the refrigerant, m times a difference
// of enthalpy; the reversible power uses the metered product heat. So unaccounted is what product
// meter and refrigerant disagree about, in work: (m (h1e - h4) - Q_L) (T_H / T_L - 1) for cooling,
// (m (h2 - h3) - Q_H) (1 - T_L / T_H) for heating, > 0 where the product meter reads low. It is 0
// by nature where m comes from one meter alone. What the meters disagree about, as heat, is the
// energy residual.
// Where only the other stream is metered the product heat follows from the energy balance.
// Casing heat is W - m (h2 - h1), less what the lines take up; the stated share of the power where
// that cannot be computed.
// The suction line is a component only where the evaporator's outlet temperature is read: else the
// evaporator reaches to the compressor, and entropy_lines and lost_lines have no sensor. Total and
// ledger then close with the other four.
// entropy_total and lost_total are the components' sums where all four exist, which is the figure
// of the two reservoirs with the refrigerant's heats; else the figure of the reservoirs with the
// metered product heat and a closed energy balance.
//
// Uncertainty: GUM, first order, from the readings' own, with the share that a matched pair has in
// common, and the casing loss where it is an input. Pure, and safe from any thread.
// Source: Gouy-Stodola theorem; Bejan, Advanced Engineering Thermodynamics, ch. 3.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/result.h"

#include <string_view>
#include <vector>

namespace lostwork {

// Every quantity of the scan; steady = false and power_expected, power_residual = no_baseline are
// left to the caller. Reasons: no_sensor, not_read, bad_quality, implausible (of a reading; blame
// names its role), outside_fluid, not_converged (of a state), machine_off (also below 2 % of rated
// power), zero_flow, contradicts (heat that flows the wrong way in a running machine, a state on
// the wrong side of saturation by more than 2 u, suction above discharge pressure; for the
// efficiency: above 1, or entropy destroyed, by more than 2 u), not_needed, lift_too_small (below
// 3 K), load_too_small (power below 10 % of rated, product heat below 2 u), not_applicable (a
// second circuit; defrost).
[[nodiscard]] Assessment assess(const MachineModel& model, const Scan& scan, Mode mode);

// One input's part in the uncertainty of one quantity.
struct Contribution {
  std::string_view input;  // the name of a role, "casing loss" or "suction quality"
  double sensitivity_SI;   // d quantity / d input
  double u_SI;             // standard uncertainty of the input
};

// The inputs that the quantity depends on, in the order of the roles. Refuses as assess does.
[[nodiscard]] Result<std::vector<Contribution>> uncertainty_budget(const MachineModel& model,
                                                                   const Scan& scan, Mode mode,
                                                                   Quantity quantity);

}  // namespace lostwork
