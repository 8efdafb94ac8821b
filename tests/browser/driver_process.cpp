#include "tests/browser/driver_process.h"

#include <array>
#include <fcntl.h>
#include <filesystem>
#include <signal.h>  // NOLINT(modernize-deprecated-headers): kill is POSIX, not ISO C
#include <spawn.h>
#include <stdexcept>
#include <string_view>
#include <sys/wait.h>
#include <system_error>
#include <unistd.h>
#include <vector>

namespace lostwork {
namespace {

constexpr const char* driver = "/usr/bin/chromedriver";
constexpr std::string_view started = "started successfully on port ";

// What the driver prints, until it names its port.
std::uint16_t port_from(int out) {
  std::string text;
  std::array<char, 512> piece{};
  for (;;) {
    const ssize_t count = read(out, piece.data(), piece.size());
    if (count <= 0) {
      throw std::runtime_error{"chromedriver did not start: " + text};
    }
    text.append(piece.data(), static_cast<std::size_t>(count));
    const std::size_t at = text.find(started);
    if (at != std::string::npos && text.find('.', at) != std::string::npos) {
      return static_cast<std::uint16_t>(std::stoi(text.substr(at + started.size())));
    }
  }
}

}  // namespace

DriverProcess::DriverProcess() {
  if (!std::filesystem::exists(driver) || !std::filesystem::exists("/usr/bin/chromium")) {
    throw std::runtime_error{
        "the browser tests need Debian's packages chromium and chromium-driver"};
  }
  std::array<int, 2> out{};
  if (pipe2(out.data(), O_CLOEXEC) != 0) {
    throw std::system_error{errno, std::generic_category(), "no pipe for chromedriver"};
  }
  posix_spawn_file_actions_t actions{};
  posix_spawn_file_actions_init(&actions);
  posix_spawn_file_actions_adddup2(&actions, out[1], STDOUT_FILENO);
  std::string name{driver};
  std::string port{"--port=0"};
  std::array<char*, 3> arguments{name.data(), port.data(), nullptr};
  const int failure = posix_spawn(&process_, driver, &actions, nullptr, arguments.data(), environ);
  posix_spawn_file_actions_destroy(&actions);
  close(out[1]);
  if (failure != 0) {
    throw std::system_error{failure, std::generic_category(), "chromedriver did not start"};
  }
  port_ = port_from(out[0]);
  close(out[0]);
}

DriverProcess::~DriverProcess() {
  kill(process_, SIGTERM);
  waitpid(process_, nullptr, 0);
}

TemporaryDirectory::TemporaryDirectory() {
  std::string pattern = std::filesystem::temp_directory_path() / "lostwork-browser-XXXXXX";
  if (mkdtemp(pattern.data()) == nullptr) {
    throw std::system_error{errno, std::generic_category(), "no directory for the browser"};
  }
  path_ = pattern;
}

TemporaryDirectory::~TemporaryDirectory() {
  std::error_code ignored;
  std::filesystem::remove_all(path_, ignored);
}

}  // namespace lostwork
