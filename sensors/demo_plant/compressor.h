// A compressor with motor and drive.
//
// Volumetric efficiency: re-expansion from the clearance and leakage past the rotors. Source of the
// clearance form: any text on reciprocating machines, e.g. Gosney, Principles of Refrigeration.
// Isentropic efficiency: best at the pressure ratio that the machine is built for, less on both
// sides and at low speed. Losses of motor and drive: constant, linear and quadratic in the shaft
// power (iron, stray, copper). The coefficients of a machine are invented; their size is common
// practice, no source.
#pragma once

namespace lostwork {

// A loss as share of the rated shaft power; x = shaft power / rated.
struct LossCurve {
  double constant;
  double linear;
  double quadratic;
};
[[nodiscard]] double loss_W(const LossCurve& curve, double shaft_W, double rated_shaft_W);

struct CompressorParameters {
  double swept_m3s;        // at full capacity
  double clearance;        // of the swept volume
  double leakage;          // share lost per unit of pressure ratio above 1, at full speed
  double best_efficiency;  // isentropic, of the gas path
  double best_pressure_ratio;
  double ratio_penalty;       // share lost per squared logarithm of ratio / best ratio
  double part_speed_penalty;  // share lost per squared missing capacity
  double rated_shaft_W;
  LossCurve motor;               // into the suction gas: semi-hermetic
  LossCurve drive;               // into the plant room
  double casing_conductance_WK;  // from the casing to the plant room
};

struct CompressorQuestion {
  double capacity;        // 0..1, of the swept volume flow
  double pressure_ratio;  // > 0
  double wear;            // share of the isentropic efficiency lost
};

[[nodiscard]] double volumetric_efficiency(const CompressorParameters& compressor,
                                           const CompressorQuestion& question);
[[nodiscard]] double isentropic_efficiency(const CompressorParameters& compressor,
                                           const CompressorQuestion& question);

}  // namespace lostwork
