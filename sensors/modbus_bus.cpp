#include "sensors/modbus_bus.h"

#include "sensors/backoff.h"
#include "sensors/frame.h"
#include "sensors/sentence.h"

#include <algorithm>
#include <array>
#include <bitset>
#include <cerrno>
#include <cstddef>
#include <fcntl.h>
#include <poll.h>
#include <random>
#include <span>
#include <sys/select.h>
#include <sys/socket.h>
#include <thread>
#include <unistd.h>
#include <utility>

#include <modbus/modbus.h>

namespace lostwork {
namespace {

using Steady = std::chrono::steady_clock;

struct CloseAndFree {
  void operator()(modbus_t* context) const {
    modbus_close(context);
    modbus_free(context);
  }
};
using Context = std::unique_ptr<modbus_t, CloseAndFree>;

// libmodbus waits with select(), which is undefined for descriptors from FD_SETSIZE on. The margin
// is for what other threads open at the same moment.
bool descriptors_in_reach() {
  constexpr int margin = 64;
  const int next = open("/dev/null", O_RDONLY | O_CLOEXEC);
  if (next < 0) {
    return false;
  }
  close(next);
  return next < FD_SETSIZE - margin;
}

bool readable_within(int descriptor, Span wait) {
  pollfd entry{.fd = descriptor, .events = POLLIN, .revents = 0};
  return poll(&entry, 1, static_cast<int>(std::max(wait, Span{0}).count())) > 0;
}

// Throws away what has come in. False: the line is gone.
bool discard(int descriptor) {
  std::array<std::uint8_t, 512> rubbish{};
  const ssize_t got = ::read(descriptor, rubbish.data(), rubbish.size());
  return got > 0 || (got < 0 && (errno == EAGAIN || errno == EINTR));
}

BlockAnswer failed(BusFailure failure) {
  BlockAnswer answer;
  answer.failure = failure;
  return answer;
}

class ModbusBus final : public Bus {
 public:
  ModbusBus(Context context, const BusOptions& options, BusClocks clocks)
      : context_{std::move(context)},
        tcp_{options.kind == BusKind::tcp},
        options_{options},
        clocks_{std::move(clocks)},
        jitter_{clocks_.jitter_seed != 0 ? clocks_.jitter_seed : std::random_device{}()} {
    modbus_set_error_recovery(context_.get(), MODBUS_ERROR_RECOVERY_NONE);
    const auto timeout_us =
        static_cast<std::uint32_t>(std::chrono::microseconds{options_.timeout}.count());
    modbus_set_response_timeout(context_.get(), timeout_us / 1000000, timeout_us % 1000000);
    modbus_set_byte_timeout(context_.get(), 0, 0);  // the answer as a whole has the timeout
  }

  [[nodiscard]] BlockAnswer read(const BlockRequest& request) override {
    BlockAnswer answer = exchanged(request);
    if (answer.failure) {
      recover(request, *answer.failure);
    } else {
      failures_ = 0;
      answered_ = true;
      answer.suspect = unsure_[request.unit];
      if (answer.suspect) {  // if it was an earlier one's, its own may come right behind
        unsure_[request.unit] = false;
        quiet_from_ = Steady::now() + options_.timeout;
      }
    }
    last_use_ = Steady::now();
    answer.time = clocks_.utc();
    return answer;
  }

 private:
  [[nodiscard]] int descriptor() const { return modbus_get_socket(context_.get()); }

  BlockAnswer exchanged(const BlockRequest& request) {
    if (connected_ && !(tcp_ ? nothing_pending() : quiet())) {
      drop();
    }
    if (!connected_ && !connect()) {
      return failed(BusFailure::connection);
    }
    std::this_thread::sleep_until(last_use_ + options_.pause);
    return tcp_ ? ask_tcp(request) : ask_rtu(request);
  }

  bool connect() {
    if (retry_at_ && clocks_.steady() < *retry_at_) {
      return false;
    }
    modbus_close(context_.get());
    connected_ = descriptors_in_reach() && modbus_connect(context_.get()) == 0;
    answered_ = false;
    if (!connected_) {
      modbus_close(context_.get());
      put_off();
    }
    return connected_;
  }

  void put_off() {
    const Span whole = backoff(options_.retry_first, options_.retry_limit, ++failures_);
    const double share = std::uniform_real_distribution{0.75, 1.0}(jitter_);
    retry_at_ = clocks_.steady() + std::chrono::duration_cast<Steady::duration>(
                                       std::chrono::duration<double, std::milli>{whole} * share);
  }

  void drop() {
    modbus_close(context_.get());
    connected_ = false;
    retry_at_.reset();
  }

  // TCP: bytes before we asked are no answer to us, and an end of the stream is common after an
  // idle time: both call for a new connection.
  [[nodiscard]] bool nothing_pending() const {
    std::uint8_t byte = 0;
    const ssize_t got = recv(descriptor(), &byte, 1, MSG_PEEK | MSG_DONTWAIT);
    return got < 0 && (errno == EAGAIN || errno == EWOULDBLOCK);
  }

  // RTU: an answer does not say which request it belongs to, so nothing may be left of an earlier
  // one. After a failure the slave's longest time to answer is waited out first. False: the line is
  // gone.
  bool quiet() {
    const auto deadline = std::max(quiet_from_, Steady::now()) + options_.timeout;
    while (Steady::now() < deadline) {
      const auto left = std::chrono::ceil<Span>(quiet_from_ - Steady::now());
      if (!readable_within(descriptor(), left)) {
        return true;
      }
      if (!discard(descriptor())) {
        return false;
      }
    }
    return true;
  }

  BlockAnswer ask_tcp(const BlockRequest& request) {
    ++transaction_;
    const auto frame = tcp_request(request, transaction_);
    if (send(descriptor(), frame.data(), frame.size(), MSG_NOSIGNAL) !=
        static_cast<ssize_t>(frame.size())) {
      return failed(BusFailure::connection);
    }
    std::array<std::uint8_t, MODBUS_MAX_ADU_LENGTH> buffer{};
    const int size = modbus_receive_confirmation(context_.get(), buffer.data());
    return size < 0 ? failed(failure_of_receive(errno))
                    : tcp_answer(request, transaction_,
                                 std::span{buffer}.first(static_cast<std::size_t>(size)));
  }

  BlockAnswer ask_rtu(const BlockRequest& request) {
    modbus_set_slave(context_.get(), request.unit);  // whose answer it takes
    const auto frame = rtu_request(request);
    if (write(descriptor(), frame.data(), frame.size()) != static_cast<ssize_t>(frame.size())) {
      return failed(BusFailure::connection);
    }
    std::array<std::uint8_t, MODBUS_MAX_ADU_LENGTH> buffer{};
    const int size = modbus_receive_confirmation(context_.get(), buffer.data());
    return size < 0 ? failed(failure_of_receive(errno))
                    : rtu_answer(request, std::span{buffer}.first(static_cast<std::size_t>(size)));
  }

  static BusFailure failure_of_receive(int error) {
    switch (error) {
      case ETIMEDOUT:
      case EINTR: return BusFailure::timeout;
      case EMBBADCRC:
      case EMBBADDATA:
      case EMBBADEXC:
      case EMBUNKEXC:
      case EMBMDATA:
      case EMBBADSLAVE: return BusFailure::malformed;
      default: return BusFailure::connection;
    }
  }

  void recover(const BlockRequest& request, BusFailure failure) {
    switch (failure) {
      case BusFailure::exception:
        failures_ = 0;
        answered_ = true;
        return;
      case BusFailure::timeout:
      case BusFailure::malformed: out_of_step(request.unit); return;
      case BusFailure::connection: lost(); return;
    }
  }

  // An answer to this request may yet come.
  void out_of_step(std::uint8_t unit) {
    if (tcp_) {
      drop();
      return;
    }
    unsure_[unit] = true;
    quiet_from_ = Steady::now() + options_.timeout;
  }

  void lost() {
    if (!connected_) {
      return;
    }
    drop();
    if (!answered_) {  // it takes connections and closes them: no better than refusing them
      put_off();
    }
  }

  Context context_;
  bool tcp_;
  BusOptions options_;
  BusClocks clocks_;
  std::minstd_rand jitter_;
  bool connected_ = false;
  bool answered_ = false;  // since it was connected
  int failures_ = 0;       // attempts to connect, one after the other
  std::optional<Steady::time_point> retry_at_;
  std::uint16_t transaction_ = 0;
  Steady::time_point last_use_{};
  Steady::time_point quiet_from_{};  // RTU: no late answer after this
  std::bitset<256> unsure_;          // RTU: units whose next answer may be a late one
};

Context context_for(const BusOptions& options) {
  if (options.kind == BusKind::rtu) {
    const SerialLine& line = options.serial;
    constexpr std::array<char, 3> letters{'N', 'E', 'O'};
    return Context{modbus_new_rtu(line.device.c_str(), line.baud,
                                  letters.at(static_cast<std::size_t>(line.parity)), 8,
                                  line.stop_bits)};
  }
  const TcpEndpoint& tcp = options.tcp;
  return tcp.host.find(':') == std::string::npos
             ? Context{modbus_new_tcp(tcp.host.c_str(), tcp.port)}
             : Context{modbus_new_tcp_pi(tcp.host.c_str(), std::to_string(tcp.port).c_str())};
}

}  // namespace

tl::expected<std::unique_ptr<Bus>, std::string> modbus_bus(const BusOptions& options,
                                                           BusClocks clocks) {
  if (const auto fault = fault_of(options)) {
    return tl::unexpected{sentence({"bus ", options.id, ": ", *fault})};
  }
  Context context = context_for(options);
  if (!context) {
    return tl::unexpected{sentence({"bus ", options.id, ": ", modbus_strerror(errno)})};
  }
  return std::make_unique<ModbusBus>(std::move(context), options, std::move(clocks));
}

}  // namespace lostwork
