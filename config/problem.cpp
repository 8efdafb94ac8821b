#include "config/problem.h"

namespace lostwork {

std::string text(const std::string& file, const Problem& problem) {
  std::string out = file;
  if (problem.line > 0) {
    out += ':' + std::to_string(problem.line);
  }
  out += ": " + problem.key;
  if (!problem.found.empty()) {
    out += " = " + problem.found;
  }
  return out + ": " + problem.allowed;
}

}  // namespace lostwork
