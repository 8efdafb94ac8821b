// The real bus on a pseudo-terminal, with a slave at its other end.
#include "sensors/frame.h"
#include "sensors/modbus_bus.h"

#include <array>
#include <atomic>
#include <cstdlib>
#include <fcntl.h>
#include <poll.h>
#include <stdexcept>
#include <string>
#include <sys/eventfd.h>
#include <termios.h>
#include <thread>
#include <unistd.h>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::ElementsAre;

constexpr Span timeout{400};
constexpr std::uint8_t slave_unit = 17;

enum class SlaveFault {
  none,
  silent,
  bad_crc,
  wrong_slave,
  late_once,      // while the master waits for the line to become quiet
  very_late_once  // after the next request, before its own answer
};

// Answers one register: the address plus 1000.
class RtuSlave {
 public:
  RtuSlave() : master_{posix_openpt(O_RDWR | O_NOCTTY | O_CLOEXEC)}, stop_{eventfd(0, 0)} {
    std::array<char, 64> path{};
    if (grantpt(master_) != 0 || unlockpt(master_) != 0 ||
        ptsname_r(master_, path.data(), path.size()) != 0) {
      throw std::runtime_error{"no pseudo-terminal for the test"};
    }
    path_ = path.data();
    held_ = open(path_.c_str(), O_RDWR | O_NOCTTY | O_CLOEXEC);  // else it hangs up between users
    termios raw{};
    tcgetattr(held_, &raw);
    cfmakeraw(&raw);
    tcsetattr(held_, TCSANOW, &raw);
    thread_ = std::thread{[this] { serve(); }};
  }
  ~RtuSlave() {
    eventfd_write(stop_, 1);
    thread_.join();
    close(held_);
    close(master_);
    close(stop_);
  }
  RtuSlave(const RtuSlave&) = delete;
  RtuSlave& operator=(const RtuSlave&) = delete;
  RtuSlave(RtuSlave&&) = delete;
  RtuSlave& operator=(RtuSlave&&) = delete;

  [[nodiscard]] const std::string& path() const { return path_; }
  void set_fault(SlaveFault fault) { fault_ = fault; }

 private:
  using Bytes = std::vector<std::uint8_t>;

  // False: nothing before `wait_ms` is over, or the end.
  [[nodiscard]] bool await(int wait_ms) const {
    std::array<pollfd, 2> watched{
        {{.fd = stop_, .events = POLLIN, .revents = 0},
         {.fd = master_, .events = POLLIN, .revents = 0}}
    };
    return poll(watched.data(), watched.size(), wait_ms) > 0 && watched[0].revents == 0;
  }

  void serve() {
    Bytes request;
    while (await(-1)) {
      std::array<std::uint8_t, 64> chunk{};
      const ssize_t got = read(master_, chunk.data(), chunk.size());
      if (got <= 0) {
        return;
      }
      request.insert(request.end(), chunk.begin(), chunk.begin() + got);
      if (request.size() >= 8) {
        respond(request);
        request.clear();
      }
    }
  }

  void respond(const Bytes& request) {
    Bytes answer = answer_to(request);
    switch (fault_.load()) {
      case SlaveFault::none: break;
      case SlaveFault::silent: return;
      case SlaveFault::bad_crc: answer.back() ^= 1U; break;
      case SlaveFault::wrong_slave:
        answer = closed({slave_unit + 1, 3, 2, answer[3], answer[4]});
        break;
      case SlaveFault::late_once:
        fault_ = SlaveFault::none;
        static_cast<void>(await(static_cast<int>(timeout.count() * 5 / 4)));
        break;
      case SlaveFault::very_late_once:
        fault_ = SlaveFault::none;
        kept_ = answer;
        return;
    }
    say(kept_);
    kept_.clear();
    say(answer);
  }

  void say(const Bytes& bytes) const {
    if (write(master_, bytes.data(), bytes.size()) != static_cast<ssize_t>(bytes.size())) {
      throw std::runtime_error{"the pseudo-terminal took no answer"};
    }
  }

  static Bytes closed(Bytes frame) {
    const std::uint16_t crc = modbus_crc(frame);
    frame.push_back(static_cast<std::uint8_t>(crc & 0xFFU));
    frame.push_back(static_cast<std::uint8_t>(crc >> 8U));
    return frame;
  }

  static Bytes answer_to(const Bytes& request) {
    const unsigned value = ((unsigned{request[2]} << 8U) | request[3]) + 1000U;
    return closed({slave_unit, request[1], 2, static_cast<std::uint8_t>(value >> 8U),
                   static_cast<std::uint8_t>(value & 0xFFU)});
  }

  int master_;
  int stop_;
  int held_ = -1;
  std::string path_;
  std::atomic<SlaveFault> fault_ = SlaveFault::none;
  Bytes kept_;
  std::thread thread_;
};

std::unique_ptr<Bus> bus_on(const std::string& device) {
  auto bus = modbus_bus({
      .id = "line",
      .kind = BusKind::rtu,
      .serial = {.device = device, .baud = 19200},
      .timeout = timeout,
      .pause = Span{               0              }
  });
  if (!bus) {
    throw std::runtime_error{bus.error()};
  }
  return std::move(*bus);
}

BlockRequest one(std::uint16_t address) {
  return {.unit = slave_unit, .table = Table::holding, .address = address, .count = 1};
}

TEST(ModbusRtu, ReadsOverASerialLine) {
  const RtuSlave slave;
  const auto bus = bus_on(slave.path());
  for (std::uint16_t address = 0; address < 10; ++address) {
    const BlockAnswer answer = bus->read(one(address));
    EXPECT_THAT(answer.words, ElementsAre(1000 + address));
    EXPECT_FALSE(answer.suspect);
  }
}

struct RtuCase {
  std::string label;
  SlaveFault fault;
  BusFailure failure;
};

class RtuFault : public testing::TestWithParam<RtuCase> {};

TEST_P(RtuFault, IsToldAndTheLineRecovers) {
  RtuSlave slave;
  const auto bus = bus_on(slave.path());
  slave.set_fault(GetParam().fault);
  EXPECT_EQ(bus->read(one(1)).failure, GetParam().failure);
  slave.set_fault(SlaveFault::none);
  EXPECT_THAT(bus->read(one(2)).words, ElementsAre(1002));
  const BlockAnswer third = bus->read(one(3));
  EXPECT_THAT(third.words, ElementsAre(1003));
  EXPECT_FALSE(third.suspect);
}

INSTANTIATE_TEST_SUITE_P(
    Each, RtuFault,
    testing::Values(RtuCase{"silent", SlaveFault::silent, BusFailure::timeout},
                    RtuCase{"bad_crc", SlaveFault::bad_crc, BusFailure::malformed},
                    RtuCase{"wrong_slave", SlaveFault::wrong_slave, BusFailure::malformed}),
    [](const auto& tested) { return tested.param.label; });

TEST(ModbusRtu, NeverTakesALateAnswerForTheNext) {
  RtuSlave slave;
  const auto bus = bus_on(slave.path());
  slave.set_fault(SlaveFault::late_once);
  EXPECT_EQ(bus->read(one(1)).failure, BusFailure::timeout);
  EXPECT_THAT(bus->read(one(2)).words, ElementsAre(1002));
}

TEST(ModbusRtu, MarksTheFirstWordsAfterATimeoutForTheyMayBeOfAnEarlierRequest) {
  RtuSlave slave;
  const auto bus = bus_on(slave.path());
  slave.set_fault(SlaveFault::very_late_once);
  EXPECT_EQ(bus->read(one(1)).failure, BusFailure::timeout);
  const BlockAnswer second = bus->read(one(2));
  EXPECT_THAT(second.words, ElementsAre(1001));  // what the line allows nobody to tell
  EXPECT_TRUE(second.suspect);
  // Its own answer came right behind; it must not be taken for the third.
  const BlockAnswer third = bus->read(one(3));
  EXPECT_THAT(third.words, ElementsAre(1003));
  EXPECT_FALSE(third.suspect);
}

TEST(ModbusRtu, TellsThatThereIsNoSuchLine) {
  const auto bus = bus_on("/dev/there-is-no-such-line");
  EXPECT_EQ(bus->read(one(0)).failure, BusFailure::connection);
}

TEST(ModbusBusOf, RefusesLineSettingsInPlainWords) {
  BusOptions options{.id = "line", .kind = BusKind::rtu, .serial = {.device = "/dev/ttyUSB0"}};
  options.serial.baud = 12345;
  EXPECT_THAT(modbus_bus(options).error(), testing::HasSubstr("bus line: baud 12345"));
  options.serial.baud = 9600;
  options.serial.stop_bits = 3;
  EXPECT_THAT(modbus_bus(options).error(), testing::HasSubstr("stop bits 3: 1 or 2"));
  options.serial.device = "";
  EXPECT_THAT(modbus_bus(options).error(), testing::HasSubstr("no device"));
}

}  // namespace
}  // namespace lostwork
