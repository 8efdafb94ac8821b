// A value with its standard uncertainty.
#pragma once

namespace lostwork {

// JCGM 100:2008 (GUM): u is the standard uncertainty (k = 1), in the unit of the value.
struct Measured {
  double value = 0.0;
  double u = 0.0;

  friend bool operator==(const Measured&, const Measured&) = default;
};

template <class Archive>
void archive(Archive& a, Measured& m) {
  a(m.value, m.u);
}

}  // namespace lostwork
