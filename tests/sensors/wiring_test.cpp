#include "sensors/wiring.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

TEST(TcpEndpointOf, TakesANumericAddressWithAPort) {
  const auto endpoint = tcp_endpoint("127.0.0.1:1502");
  ASSERT_TRUE(endpoint.has_value());
  EXPECT_EQ(endpoint->host, "127.0.0.1");
  EXPECT_EQ(endpoint->port, 1502);
}

TEST(TcpEndpointOf, TakesThePortOfModbusWhereNoneIsGiven) {
  EXPECT_EQ(tcp_endpoint("10.0.0.7")->port, 502);  // assigned to mbap by IANA
}

TEST(TcpEndpointOf, TakesAnAddressOfVersionSixInBrackets) {
  const auto endpoint = tcp_endpoint("[2001:db8::7]:1502");
  ASSERT_TRUE(endpoint.has_value());
  EXPECT_EQ(endpoint->host, "2001:db8::7");
  EXPECT_EQ(endpoint->port, 1502);
  EXPECT_EQ(tcp_endpoint("[::1]")->port, 502);
}

class BadEndpoint : public testing::TestWithParam<const char*> {};

TEST_P(BadEndpoint, IsRefusedWithASentenceThatShowsIt) {
  const auto endpoint = tcp_endpoint(GetParam());
  ASSERT_FALSE(endpoint.has_value());
  EXPECT_THAT(endpoint.error(), testing::HasSubstr(GetParam()));
}

INSTANTIATE_TEST_SUITE_P(Each, BadEndpoint,
                         testing::Values("plc.example:502", "", ":502", "10.0.0.7:", "10.0.0.7:0",
                                         "10.0.0.7:65536", "10.0.0.7:-1", "10.0.0.7:5x",
                                         "10.0.0.256:502", "[::1]:x", "[::1"));

TEST(PointsOf, AreThoseOfTheMachineInTheirOrder) {
  Wiring wiring;
  for (const char* machine : {"a", "b", "a"}) {
    PointSpec point;
    point.machine = machine;
    wiring.points.push_back(point);
  }
  EXPECT_THAT(points_of(wiring, "a"), testing::ElementsAre(0, 2));
  EXPECT_THAT(points_of(wiring, "c"), testing::IsEmpty());
}

TEST(NamesOfBuses, AreThoseOfThePlantFile) {
  EXPECT_EQ(bus_kind_named("rtu_over_tcp"), BusKind::rtu_over_tcp);
  EXPECT_EQ(name(BusKind::tcp), "tcp");
  EXPECT_EQ(parity_named("even"), Parity::even);
  EXPECT_EQ(name(Parity::none), "none");
  EXPECT_EQ(bus_kind_named("udp"), std::nullopt);
}

}  // namespace
}  // namespace lostwork
