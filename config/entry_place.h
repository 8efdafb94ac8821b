// Where one table of the plant file stands, and what is already known to be wrong in it.
//
// The tables are read on after a problem, so that one run tells all of them; what is checked later
// asks here, so that nothing is told twice.
#pragma once

#include "config/problem.h"

#include <cstdint>
#include <functional>
#include <map>
#include <set>
#include <string>
#include <string_view>

namespace lostwork {

struct WrittenKey {
  std::uint32_t line = 0;
  std::string text;  // the value, as it stands in the file
};

struct EntryPlace {
  std::uint32_t line = 0;  // of its header; 0: it is not in the file
  std::string name{};      // for messages: point "ch1_cold_in"; point[3] where it has no id
  std::map<std::string, WrittenKey, std::less<>> written{};
  std::set<std::string, std::less<>> refused{};  // keys that have a problem already

  // Whether nothing is known to be wrong with the key; "accuracy.class" belongs to accuracy.
  [[nodiscard]] bool sound(std::string_view key) const;
};

// Notes a problem at the key's line (the header's where it is not written), unless the key has one
// already. `found` empty: the value as it is written.
void refuse(Problems& problems, const EntryPlace& place, std::string_view key, std::string allowed,
            std::string found = {});

}  // namespace lostwork
