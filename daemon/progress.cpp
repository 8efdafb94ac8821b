#include "daemon/progress.h"

#include <unistd.h>
#include <utility>

namespace lostwork {
namespace {

constexpr std::chrono::milliseconds first_after{1000};
constexpr std::chrono::milliseconds period{250};
constexpr std::size_t steps_between_looks = 256;  // a look at the clock costs more than most steps

}  // namespace

Progress::Progress(std::ostream& out, std::string what, std::size_t total)
    : out_{out},
      what_{std::move(what)},
      total_{total},
      terminal_{isatty(STDERR_FILENO) == 1},
      next_{std::chrono::steady_clock::now() + first_after} {}

Progress::~Progress() {
  if (shown_) {
    out_ << "\r\033[K" << std::flush;
  }
}

void Progress::step() {
  ++done_;
  if (!terminal_ || done_ % steps_between_looks != 0) {
    return;
  }
  const auto now = std::chrono::steady_clock::now();
  if (now >= next_) {
    next_ = now + period;
    show();
  }
}

void Progress::show() {
  shown_ = true;
  out_ << '\r' << what_ << ' ';
  if (total_ > 0) {
    out_ << 100 * done_ / total_ << " %";
  } else {
    out_ << done_;
  }
  out_ << "\033[K" << std::flush;
}

}  // namespace lostwork
