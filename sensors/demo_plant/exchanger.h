// Heat exchangers by effectiveness and number of transfer units.
//
// Source: Kays & London, Compact Heat Exchangers; Incropera et al., Fundamentals of Heat and Mass
// Transfer, ch. 11 (effectiveness-NTU relations).
#pragma once

namespace lostwork {

// Resistances at the rated water flow; together they are 1/UA of the clean exchanger.
struct ExchangerParameters {
  double water_resistance_SI;  // K/W; goes with flow^-0.8 (turbulent tube flow, Dittus-Boelter)
  double refrigerant_resistance_SI;  // K/W; wall included
  double rated_kgs;                  // water
  double heat_capacity_SI;           // J/K: metal, liquid refrigerant, water inside
};

// UA in W/K; fouling is the added resistance over the clean one at rated flow.
[[nodiscard]] double conductance_WK(const ExchangerParameters& exchanger, double water_kgs,
                                    double fouling);

// Water against a refrigerant that boils or condenses at one temperature; ntu = UA / (m cp).
[[nodiscard]] double effectiveness(double ntu);

// Counterflow; capacity_ratio = smaller / larger heat capacity flow, 0..1; ntu of the smaller.
[[nodiscard]] double counterflow_effectiveness(double ntu, double capacity_ratio);

}  // namespace lostwork
