#include "tests/daemon/child_program.h"

#include <array>
#include <cerrno>
#include <csignal>
#include <fcntl.h>
#include <poll.h>
#include <spawn.h>
#include <stdexcept>
#include <sys/syscall.h>
#include <sys/wait.h>
#include <system_error>
#include <unistd.h>

namespace lostwork {
namespace {

bool readable(int fd, std::chrono::seconds limit) {
  pollfd wanted{.fd = fd, .events = POLLIN, .revents = 0};
  return poll(&wanted, 1, static_cast<int>(std::chrono::milliseconds{limit}.count())) == 1;
}

}  // namespace

ChildProgram::ChildProgram(const std::vector<std::string>& arguments) {
  std::array<int, 2> ends{};
  if (pipe2(ends.data(), O_CLOEXEC) != 0) {
    throw std::runtime_error{"pipe: " + std::generic_category().message(errno)};
  }
  std::vector<std::string> words{LOSTWORK_PROGRAM};
  words.insert(words.end(), arguments.begin(), arguments.end());
  std::vector<char*> pointers;
  for (std::string& word : words) {
    pointers.push_back(word.data());
  }
  pointers.push_back(nullptr);
  posix_spawn_file_actions_t actions{};
  posix_spawn_file_actions_init(&actions);
  posix_spawn_file_actions_adddup2(&actions, ends[1], STDERR_FILENO);
  const int error =
      posix_spawn(&pid_, LOSTWORK_PROGRAM, &actions, nullptr, pointers.data(), environ);
  posix_spawn_file_actions_destroy(&actions);
  close(ends[1]);
  error_fd_ = ends[0];
  if (error != 0) {
    throw std::runtime_error{"posix_spawn: " + std::generic_category().message(error)};
  }
}

ChildProgram::~ChildProgram() {
  if (pid_ > 0) {
    kill(pid_, SIGKILL);
    waitpid(pid_, nullptr, 0);
  }
  close(error_fd_);
}

std::string ChildProgram::wait_for_line(const std::string& text, std::chrono::seconds limit) {
  for (;;) {
    const auto end = unread_.find('\n');
    if (end != std::string::npos) {
      std::string line = unread_.substr(0, end);
      unread_.erase(0, end + 1);
      if (line.find(text) != std::string::npos) {
        return line;
      }
      continue;
    }
    std::array<char, 4096> buffer{};
    const ssize_t size =
        readable(error_fd_, limit) ? read(error_fd_, buffer.data(), buffer.size()) : 0;
    if (size <= 0) {
      throw std::runtime_error{"never said \"" + text + "\"; said:\n" + said_};
    }
    unread_.append(buffer.data(), static_cast<std::size_t>(size));
    said_.append(buffer.data(), static_cast<std::size_t>(size));
  }
}

void ChildProgram::signal(int number) const {
  kill(pid_, number);
}

int ChildProgram::wait(std::chrono::seconds limit) {
  const int fd = static_cast<int>(syscall(SYS_pidfd_open, pid_, 0));
  const bool ended = readable(fd, limit);
  close(fd);
  if (!ended) {
    throw std::runtime_error{"did not end; said:\n" + said_};
  }
  int status = 0;
  waitpid(pid_, &status, 0);
  pid_ = -1;
  return WIFEXITED(status) ? WEXITSTATUS(status) : -WTERMSIG(status);
}

}  // namespace lostwork
