// config/examples/tern_quay_dairy.toml, embedded at build time.
#pragma once

#include <string_view>

namespace lostwork {

[[nodiscard]] std::string_view demo_plant_file();

}  // namespace lostwork
