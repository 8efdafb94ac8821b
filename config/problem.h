// What is wrong with a file that a person wrote.
#pragma once

#include <cstdint>
#include <ostream>
#include <string>
#include <vector>

namespace lostwork {

struct Problem {
  std::uint32_t line = 0;  // from 1; 0 where the trouble is that something is not there
  std::string key;         // "point[3].register"
  std::string found;       // the value, as it stands in the file; empty where there is none
  std::string allowed;     // "a whole number from 0 to 65535"
};

using Problems = std::vector<Problem>;

// "plant.toml:12: point[3].register = -1: allowed is a whole number from 0 to 65535"
[[nodiscard]] std::string text(const std::string& file, const Problem& problem);

// A line each.
void tell(std::ostream& out, const std::string& file, const Problems& problems);

}  // namespace lostwork
