// Reads every point of a plant once, to see whether the wiring is right.
#pragma once

#include "sensors/wiring.h"

#include <ostream>

namespace lostwork {

// A line a point: value in its unit and quality. True when all could be read.
bool probe(const Wiring& wiring, std::ostream& out);

}  // namespace lostwork
