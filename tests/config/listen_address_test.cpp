#include "config/listen_address.h"

#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

TEST(ListenAddressText, TakesTheLoopbackOfIpv4) {
  const auto address = listen_address("127.0.0.1:8470");
  ASSERT_TRUE(address);
  EXPECT_EQ(address->address, "127.0.0.1");
  EXPECT_EQ(address->port, 8470);
}

TEST(ListenAddressText, TakesTheLoopbackOfIpv6) {
  const auto address = listen_address("[::1]:8470");
  ASSERT_TRUE(address);
  EXPECT_EQ(address->address, "::1");
}

TEST(ListenAddressText, TakesLocalhostForTheLoopback) {
  const auto address = listen_address("localhost:0");
  ASSERT_TRUE(address);
  EXPECT_EQ(address->address, "127.0.0.1");
}

class AddressOfOthers : public testing::TestWithParam<std::string> {};

TEST_P(AddressOfOthers, IsRefusedUntilThereAreAccounts) {
  const auto address = listen_address(GetParam());
  ASSERT_FALSE(address);
  EXPECT_THAT(address.error(), testing::HasSubstr("until there are user accounts"));
}

INSTANTIATE_TEST_SUITE_P(Text, AddressOfOthers,
                         testing::Values("0.0.0.0:8470", "192.168.1.5:80", "[::]:8470",
                                         "[2001:db8::1]:80", "[::ffff:10.0.0.1]:80"));

class NoAddress : public testing::TestWithParam<std::string> {};

TEST_P(NoAddress, IsRefusedWithAnExample) {
  const auto address = listen_address(GetParam());
  ASSERT_FALSE(address);
  EXPECT_THAT(address.error(), testing::HasSubstr("127.0.0.1:8470"));
}

INSTANTIATE_TEST_SUITE_P(Text, NoAddress,
                         testing::Values("", "8470", ":8470", "127.0.0.1",
                                         "127.0.0.1:", "127.0.0.1:65536", "127.0.0.1:-1",
                                         "127.0.0.1:80x", "::1:80", "dairy.example:80", "[::1:80"));

}  // namespace
}  // namespace lostwork
