// Tells a person at a terminal how far long work has come; silent elsewhere, and within the first
// second.
#pragma once

#include <chrono>
#include <cstddef>
#include <ostream>
#include <string>

namespace lostwork {

class Progress {
 public:
  // Shown on `out` only where standard error is a terminal. total: of step() calls, may be 0.
  Progress(std::ostream& out, std::string what, std::size_t total);
  Progress(const Progress&) = delete;
  Progress& operator=(const Progress&) = delete;
  ~Progress();

  void step();

 private:
  void show();

  std::ostream& out_;
  std::string what_;
  std::size_t total_;
  std::size_t done_ = 0;
  bool terminal_;
  bool shown_ = false;
  std::chrono::steady_clock::time_point next_;
};

}  // namespace lostwork
