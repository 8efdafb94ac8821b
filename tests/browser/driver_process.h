// chromedriver as a child process.
#pragma once

#include <cstdint>
#include <string>
#include <sys/types.h>

namespace lostwork {

class DriverProcess {
 public:
  DriverProcess();   // throws std::runtime_error where there is none, or it does not start
  ~DriverProcess();  // ends it and waits for that
  DriverProcess(const DriverProcess&) = delete;
  DriverProcess& operator=(const DriverProcess&) = delete;

  [[nodiscard]] std::uint16_t port() const { return port_; }

 private:
  pid_t process_ = -1;
  std::uint16_t port_ = 0;
};

// A directory that goes with the object.
class TemporaryDirectory {
 public:
  TemporaryDirectory();
  ~TemporaryDirectory();
  TemporaryDirectory(const TemporaryDirectory&) = delete;
  TemporaryDirectory& operator=(const TemporaryDirectory&) = delete;

  [[nodiscard]] const std::string& path() const { return path_; }

 private:
  std::string path_;
};

}  // namespace lostwork
