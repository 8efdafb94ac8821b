#include "config/entry_place.h"

#include <utility>

namespace lostwork {
namespace {

// The part of "accuracy.class" that is a key of the table itself.
std::string_view own_key(std::string_view key) {
  return key.substr(0, key.find('.'));
}

}  // namespace

bool EntryPlace::sound(std::string_view key) const {
  return !refused.contains(own_key(key));
}

void refuse(Problems& problems, const EntryPlace& place, std::string_view key, std::string allowed,
            std::string found) {
  if (!place.sound(key)) {
    return;
  }
  const auto at = place.written.find(own_key(key));
  const bool is_written = at != place.written.end();
  if (found.empty() && is_written) {
    found = at->second.text;
  }
  problems.push_back({.line = is_written ? at->second.line : place.line,
                      .key = place.name + '.' + std::string{key},
                      .found = std::move(found),
                      .allowed = std::move(allowed)});
}

}  // namespace lostwork
