#include "thermo/cycle/machine_model.h"

namespace lostwork {

std::optional<std::size_t> MachineModel::index_of(Role role) const {
  for (std::size_t i = 0; i < points.size(); ++i) {
    if (points[i].role == role && points[i].circuit == 1) {
      return i;
    }
  }
  return std::nullopt;
}

}  // namespace lostwork
