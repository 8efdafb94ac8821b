// The poller on the real bus against a server with faults: nothing wrong is ever marked good, and
// nothing but reading ever reaches the wire.
#include "sensors/modbus_bus.h"
#include "sensors/poller.h"
#include "tests/sensors/modbus_server.h"
#include "tests/sensors/test_wiring.h"

#include <memory>
#include <stdexcept>
#include <utility>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

constexpr Span timeout{400};

std::unique_ptr<Bus> bus_to(const ModbusServer& server) {
  auto bus = modbus_bus({
      .id = "plc",
      .tcp = {.host = "127.0.0.1", .port = server.port()},
      .timeout = timeout,
      .pause = Span{                  0                      }
  });
  if (!bus) {
    throw std::runtime_error{bus.error()};
  }
  return std::move(*bus);
}

PointSpec point_at(const RegisterSpec& at) {
  PointSpec point = test::power_at("chiller-1", "panel", at.address);
  point.source = FromRegister{.device = "panel", .at = at};
  point.role = holds_bits(at.table) ? Role::mode : Role::cold_in_temperature;
  point.unit = holds_bits(at.table) ? Unit::one : Unit::degC;
  return point;
}

TEST(Polling, SendsNothingButTheFourFunctionCodesThatRead) {
  ModbusServer server;
  const auto bus = bus_to(server);
  Wiring wiring = test::empty_wiring();
  wiring.points = {point_at({.table = Table::holding, .address = 10}),
                   point_at({.table = Table::input, .address = 10}),
                   point_at({.table = Table::coil, .address = 10, .type = RawType::bit}),
                   point_at({.table = Table::discrete, .address = 10, .type = RawType::bit})};
  Poller poller{wiring, "plc", *bus};
  Instant now = test::start;
  for (const Fault fault : {Fault::none, Fault::wrong_unit, Fault::cut, Fault::exception_busy,
                            Fault::garbage, Fault::none}) {
    server.set_fault(10, fault);
    static_cast<void>(poller.poll(now));
    now += std::chrono::minutes{2};
  }
  EXPECT_THAT(server.function_codes(), testing::ElementsAre(1, 2, 3, 4));
}

TEST(Polling, ReadsTemperaturesOfEveryTypeFromOneServer) {
  ModbusServer server;
  const std::vector<std::pair<std::uint16_t, std::uint16_t>> words{
      {0, 0xFFF6}, // s16: -10
      {1, 0x4146},
      {2, 0x0000}, // f32, ABCD: 12.375
      {3, 0x0003},
      {4, 0x0001}  // u32, CDAB: 65539, times 1e-3
  };
  for (const auto& [address, word] : words) {
    server.set_word(address, word);
  }
  const auto bus = bus_to(server);
  Wiring wiring = test::empty_wiring();
  wiring.points = {
      point_at({.address = 0, .type = RawType::s16, .scale = 0.5}),
      point_at({.address = 1, .type = RawType::f32}),
      point_at({.address = 3, .type = RawType::u32, .order = ByteOrder::cdab, .scale = 1e-3})};
  Poller poller{wiring, "plc", *bus};
  std::vector<double> values_SI;
  for (const PointReading& reading : poller.poll(test::start)) {
    EXPECT_EQ(reading.reading.quality, Quality::good);
    values_SI.push_back(reading.reading.value_SI);
  }
  using testing::DoubleNear;
  EXPECT_THAT(values_SI,
              testing::ElementsAre(DoubleNear(273.15 - 5.0, 1e-9), DoubleNear(285.525, 1e-9),
                                   DoubleNear(273.15 + 65.539, 1e-9)));
}

class AnyFault : public testing::TestWithParam<Fault> {};

// The block at 10 has the fault; the one at 100 of the same device must be right, or have a reason.
TEST_P(AnyFault, NeverMarksAWrongValueGood) {
  ModbusServer server;
  server.set_word(10, 111);
  server.set_word(100, 222);
  server.set_fault(10, GetParam());
  const auto bus = bus_to(server);
  Wiring wiring = test::empty_wiring();
  wiring.points = {point_at({.address = 10}), point_at({.address = 100})};
  Poller poller{wiring, "plc", *bus};
  for (int i = 0; i < 4; ++i) {
    for (const PointReading& reading : poller.poll(test::start + i * test::period)) {
      if (reading.reading.quality == Quality::good) {
        EXPECT_NEAR(reading.reading.value_SI, reading.point == 0 ? 384.15 : 495.15, 1e-9);
      }
    }
  }
}

INSTANTIATE_TEST_SUITE_P(
    Each, AnyFault,
    testing::Values(Fault::late, Fault::cut, Fault::close, Fault::doubled, Fault::trailing,
                    Fault::garbage, Fault::wrong_transaction, Fault::wrong_protocol,
                    Fault::wrong_length, Fault::wrong_unit, Fault::wrong_function,
                    Fault::fewer_registers, Fault::exception_busy, Fault::exception_unknown),
    [](const auto& tested) { return "Fault" + std::to_string(static_cast<int>(tested.param)); });

TEST(Polling, MarksANotANumberFromTheWireOutOfRange) {
  ModbusServer server;
  server.set_word(0, 0x7FC0);
  server.set_word(1, 0x0000);
  const auto bus = bus_to(server);
  Wiring wiring = test::empty_wiring();
  wiring.points = {point_at({.address = 0, .type = RawType::f32})};
  Poller poller{wiring, "plc", *bus};
  EXPECT_EQ(poller.poll(test::start).at(0).reading.quality, Quality::out_of_range);
}

TEST(Polling, GoesOnWithOtherBusesWhenOneServerIsSilent) {
  ModbusServer dead;
  dead.set_fault(0, Fault::silent);
  ModbusServer alive;
  const auto dead_bus = bus_to(dead);
  const auto alive_bus = bus_to(alive);
  Wiring wiring = test::empty_wiring();
  wiring.devices[1].bus = "second";
  wiring.points = {point_at({.address = 0}), test::power_at("chiller-1", "meter", 0)};
  Poller dead_poller{wiring, "plc", *dead_bus};
  Poller alive_poller{wiring, "second", *alive_bus};
  EXPECT_EQ(dead_poller.poll(test::start).at(0).reading.quality, Quality::timeout);
  EXPECT_EQ(alive_poller.poll(test::start).at(0).reading.quality, Quality::good);
}

}  // namespace
}  // namespace lostwork
