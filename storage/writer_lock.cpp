#include "storage/writer_lock.h"

#include <array>
#include <cerrno>
#include <fcntl.h>
#include <filesystem>
#include <stdexcept>
#include <string_view>
#include <sys/file.h>
#include <system_error>
#include <unistd.h>

namespace lostwork {
namespace {

// Two names for one file must meet the same lock.
std::string real_name(const std::string& file) {
  std::error_code error;
  const auto real = std::filesystem::weakly_canonical(file, error);
  return error ? file : real.string();
}

std::string holder(int descriptor) {
  std::array<char, 20> text{};
  const ssize_t size = pread(descriptor, text.data(), text.size() - 1, 0);
  const std::string_view number{text.data(), size > 0 ? static_cast<std::size_t>(size) : 0};
  const auto digits = number.substr(0, number.find_first_not_of("0123456789"));
  return digits.empty() ? std::string{} : " (process " + std::string{digits} + ")";
}

}  // namespace

WriterLock::WriterLock(const std::string& file) {
  const std::string name = real_name(file) + "-writer";
  descriptor_ = open(name.c_str(), O_RDWR | O_CREAT | O_CLOEXEC | O_NOFOLLOW, 0600);
  if (descriptor_ < 0) {
    throw std::runtime_error{file + ": cannot be written: " + name + ": " +
                             std::generic_category().message(errno)};
  }
  if (flock(descriptor_, LOCK_EX | LOCK_NB) != 0) {
    const std::string why = errno == EWOULDBLOCK
                                ? ": another lostwork writes it" + holder(descriptor_)
                                : ": cannot be locked: " + std::generic_category().message(errno);
    close(descriptor_);
    throw std::runtime_error{file + why};
  }
  // Only for the other one's sentence: a full disk does not matter.
  const std::string number = std::to_string(getpid()) + "\n";
  if (ftruncate(descriptor_, 0) != 0 || pwrite(descriptor_, number.data(), number.size(), 0) < 0) {
    return;
  }
}

WriterLock::~WriterLock() {
  close(descriptor_);
}

}  // namespace lostwork
