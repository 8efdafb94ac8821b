// The program as a process of its own, for tests that kill it.
#pragma once

#include <chrono>
#include <string>
#include <sys/types.h>
#include <vector>

namespace lostwork {

class ChildProgram {
 public:
  // Starts it; standard error is read by wait_for_line.
  explicit ChildProgram(const std::vector<std::string>& arguments);
  ChildProgram(const ChildProgram&) = delete;
  ChildProgram& operator=(const ChildProgram&) = delete;
  ~ChildProgram();  // kills it where it still runs

  // Reads on until a line holds `text`, and gives that line; throws std::runtime_error with all
  // that was said when the program ends, or nothing comes for `limit`.
  [[nodiscard]] std::string wait_for_line(const std::string& text,
                                          std::chrono::seconds limit = std::chrono::seconds{60});
  void signal(int number) const;
  // Its exit code, or -signal; throws where it does not end within `limit`.
  [[nodiscard]] int wait(std::chrono::seconds limit = std::chrono::seconds{30});

 private:
  pid_t pid_ = -1;
  int error_fd_ = -1;
  std::string unread_;
  std::string said_;
};

}  // namespace lostwork
