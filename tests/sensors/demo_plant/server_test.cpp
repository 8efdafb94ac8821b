// The demo plant's server, asked over real sockets by the program's own bus and by hand.
#include "sensors/demo_plant/server.h"

#include "sensors/frame.h"
#include "sensors/modbus_bus.h"

#include <arpa/inet.h>
#include <array>
#include <memory>
#include <netinet/in.h>
#include <string>
#include <sys/socket.h>
#include <sys/time.h>
#include <system_error>
#include <thread>
#include <unistd.h>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

const Instant monday = std::chrono::sys_days{std::chrono::June / 1 / 2026};

RegisterImage image_of(std::vector<PlantFault> faults = {}) {
  Plant plant{
      PlantOptions{.seed = 1, .start = monday, .faults = std::move(faults)}
  };
  plant.step(std::chrono::hours{1});
  return register_image(plant);
}

PlantFault silent_meters() {
  return parse_fault("device_silent:device=heat-meters,from=2026-06-01,to=2026-06-02",
                     plant_fault_targets());
}

std::unique_ptr<Bus> bus_to(const DemoServer& server, Span timeout = Span{2000}) {
  BusOptions options;
  options.id = "test";
  options.tcp = {.host = "127.0.0.1", .port = server.port()};
  options.timeout = timeout;
  options.pause = Span{0};
  return std::move(modbus_bus(options).value());
}

constexpr BlockRequest panel{.unit = 1, .table = Table::input, .address = 0, .count = 13};

TEST(DemoServer, ShowsTheImageToTheProgramsOwnBus) {
  const RegisterImage image = image_of();
  const DemoServer server{0, image};
  const auto bus = bus_to(server);
  const std::array requests{
      panel, BlockRequest{.unit = 2,  .table = Table::holding, .address = 100, .count = 14},
      BlockRequest{.unit = 3,    .table = Table::input,   .address = 0, .count = 38},
      BlockRequest{.unit = 1, .table = Table::discrete,   .address = 0,  .count = 1}
  };
  for (const BlockRequest& request : requests) {
    const BlockAnswer got = bus->read(request);
    ASSERT_FALSE(got.failure);
    EXPECT_EQ(got.words, answer(image, request).words);
  }
}

TEST(DemoServer, ShowsANewImageFromThenOn) {
  RegisterImage image = image_of();
  DemoServer server{0, image};
  const auto bus = bus_to(server);
  image.devices.front().tables[static_cast<std::size_t>(Table::input)][2] = 4711;
  server.show(image);
  EXPECT_EQ(bus->read(panel).words.at(2), 4711);
}

TEST(DemoServer, AnswersSeveralClients) {
  const DemoServer server{0, image_of()};
  std::vector<std::unique_ptr<Bus>> buses;
  for (int i = 0; i < 8; ++i) {
    buses.push_back(bus_to(server));
  }
  for (const auto& bus : buses) {
    EXPECT_FALSE(bus->read(panel).failure);
  }
}

TEST(DemoServer, TellsWhatADeviceDoesNotHave) {
  const DemoServer server{0, image_of()};
  const auto bus = bus_to(server);
  BlockRequest beyond = panel;
  beyond.address = 500;
  const BlockAnswer got = bus->read(beyond);
  EXPECT_EQ(got.failure, BusFailure::exception);
  EXPECT_EQ(got.exception_code, 2);
}

TEST(DemoServer, ASilentDeviceDoesNotAnswer) {
  const DemoServer server{0, image_of({silent_meters()})};
  const auto bus = bus_to(server, Span{150});
  EXPECT_EQ(bus->read({.unit = 3, .table = Table::input, .address = 0, .count = 4}).failure,
            BusFailure::timeout);
}

TEST(DemoServer, APortInUseIsNamed) {
  const DemoServer server{0, image_of()};
  try {
    const DemoServer second{server.port(), image_of()};
    FAIL() << "two servers at one port";
  } catch (const std::system_error& error) {
    EXPECT_NE(std::string{error.what()}.find(std::to_string(server.port())), std::string::npos);
  }
}

// A connection that sends whatever bytes a test wants.
class RawClient {
 public:
  explicit RawClient(const DemoServer& server) : fd_{::socket(AF_INET, SOCK_STREAM, 0)} {
    sockaddr_in address{};
    address.sin_family = AF_INET;
    address.sin_port = htons(server.port());
    address.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
    EXPECT_EQ(::connect(fd_, reinterpret_cast<const sockaddr*>(&address), sizeof address), 0);
    const timeval patience{.tv_sec = 5, .tv_usec = 0};
    ::setsockopt(fd_, SOL_SOCKET, SO_RCVTIMEO, &patience, sizeof patience);
  }
  RawClient(const RawClient&) = delete;
  RawClient& operator=(const RawClient&) = delete;
  RawClient(RawClient&&) = delete;
  RawClient& operator=(RawClient&&) = delete;
  ~RawClient() { ::close(fd_); }

  void send(const std::vector<std::uint8_t>& bytes) const {
    ASSERT_EQ(::send(fd_, bytes.data(), bytes.size(), MSG_NOSIGNAL),
              static_cast<ssize_t>(bytes.size()));
  }
  // What comes next, up to `count` bytes; fewer where the server closes.
  [[nodiscard]] std::vector<std::uint8_t> receive(std::size_t count) const {
    std::vector<std::uint8_t> bytes(count);
    std::size_t got = 0;
    while (got < count) {
      const ssize_t n = ::recv(fd_, bytes.data() + got, count - got, 0);
      if (n <= 0) {
        break;
      }
      got += static_cast<std::size_t>(n);
    }
    bytes.resize(got);
    return bytes;
  }

 private:
  int fd_;
};

using Frame = std::vector<std::uint8_t>;

struct Write {
  const char* name;
  Frame frame;
};

class DemoServerRefuses : public testing::TestWithParam<Write> {};

TEST_P(DemoServerRefuses, AWriteWithExceptionOne) {
  const DemoServer server{0, image_of()};
  const RawClient client{server};
  client.send(GetParam().frame);
  const auto function = static_cast<std::uint8_t>(GetParam().frame[7] | 0x80U);
  EXPECT_EQ(client.receive(9), (Frame{0, 9, 0, 0, 0, 3, 2, function, 1}));
}

// Transaction 9, unit 2. Function codes: MODBUS Application Protocol V1.1b3, 6.
INSTANTIATE_TEST_SUITE_P(
    Writes, DemoServerRefuses,
    testing::Values(
        Write{
            "Coil", {0, 9, 0, 0, 0, 6, 2, 5, 0, 0, 0xff, 0}
},
        Write{"Register", {0, 9, 0, 0, 0, 6, 2, 6, 0, 100, 0, 1}},
        Write{"Coils", {0, 9, 0, 0, 0, 8, 2, 15, 0, 0, 0, 1, 1, 1}},
        Write{"Registers", {0, 9, 0, 0, 0, 9, 2, 16, 0, 100, 0, 1, 2, 0, 1}},
        Write{"Mask", {0, 9, 0, 0, 0, 8, 2, 22, 0, 100, 0, 0, 0, 1}},
        Write{"ReadAndWrite", {0, 9, 0, 0, 0, 13, 2, 23, 0, 100, 0, 1, 0, 100, 0, 1, 2, 0, 1}}),
    [](const auto& row) { return std::string{row.param.name}; });

TEST(DemoServer, WaitsForARequestThatComesInPieces) {
  const DemoServer server{0, image_of()};
  const RawClient client{server};
  const auto request = tcp_request(panel, 5);
  client.send({request.begin(), request.begin() + 5});
  client.send({request.begin() + 5, request.end()});
  EXPECT_EQ(client.receive(9 + 26).size(), 9U + 26U);
}

TEST(DemoServer, AnswersTwoRequestsThatComeTogether) {
  const DemoServer server{0, image_of()};
  const RawClient client{server};
  const auto one = tcp_request(panel, 5);
  const auto two = tcp_request(panel, 6);
  Frame both{one.begin(), one.end()};
  both.insert(both.end(), two.begin(), two.end());
  client.send(both);
  const Frame got = client.receive(2U * (9 + 26));
  ASSERT_EQ(got.size(), 2U * (9 + 26));
  EXPECT_EQ(got[1], 5);
  EXPECT_EQ(got[9 + 26 + 1], 6);
}

TEST(DemoServer, HangsUpOnWhatIsNotModbus) {
  const DemoServer server{0, image_of()};
  const RawClient client{server};
  client.send({'G', 'E', 'T', ' ', '/', ' ', 'H', 'T', 'T', 'P'});
  EXPECT_TRUE(client.receive(1).empty());
}

TEST(DemoServer, RefusesARequestOfTheWrongLength) {
  const DemoServer server{0, image_of()};
  const RawClient client{server};
  client.send({0, 9, 0, 0, 0, 4, 1, 4, 0, 0});
  EXPECT_EQ(client.receive(9), (Frame{0, 9, 0, 0, 0, 3, 1, 0x84, 3}));
}

TEST(DemoServer, EndsWithClientsConnected) {
  auto server = std::make_unique<DemoServer>(0, image_of());
  const RawClient client{*server};
  server.reset();
  EXPECT_TRUE(client.receive(1).empty());
}

}  // namespace
}  // namespace lostwork
