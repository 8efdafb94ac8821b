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

void tell(std::ostream& out, const std::string& file, const Problems& problems) {
  for (const Problem& problem : problems) {
    out << text(file, problem) << '\n';
  }
}

}  // namespace lostwork
