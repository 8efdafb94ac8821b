// Published frames: MODBUS Application Protocol V1.1b3, 6.1 (coils 20 to 38) and 6.3 (registers 108
// to 110); Messaging on TCP/IP Implementation Guide V1.0b, the example of 4.4.2.1 (from memory).
#include "sensors/frame.h"

#include <string_view>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::ElementsAre;
using Bytes = std::vector<std::uint8_t>;

const BlockRequest one_register{.unit = 0xFF, .table = Table::holding, .address = 4, .count = 1};
const BlockRequest three_registers{.unit = 1, .table = Table::holding, .address = 107, .count = 3};
const BlockRequest nineteen_coils{.unit = 1, .table = Table::coil, .address = 19, .count = 19};

Bytes with_crc(Bytes frame) {
  const std::uint16_t crc = modbus_crc(frame);
  frame.push_back(static_cast<std::uint8_t>(crc & 0xFFU));
  frame.push_back(static_cast<std::uint8_t>(crc >> 8U));
  return frame;
}

TEST(TcpRequest, IsThePublishedFrame) {
  EXPECT_THAT(tcp_request(one_register, 0x1501),
              ElementsAre(0x15, 0x01, 0, 0, 0, 6, 0xFF, 0x03, 0, 4, 0, 1));
}

TEST(TcpAnswer, HasTheValueOfThePublishedFrame) {
  const BlockAnswer answer =
      tcp_answer(one_register, 0x1501, Bytes{0x15, 0x01, 0, 0, 0, 5, 0xFF, 0x03, 2, 0, 5});
  EXPECT_EQ(answer.failure, std::nullopt);
  EXPECT_THAT(answer.words, ElementsAre(5));
}

TEST(TcpAnswer, HasTheRegistersOfThePublishedPdu) {
  const BlockAnswer answer = tcp_answer(
      three_registers, 7, Bytes{0, 7, 0, 0, 0, 9, 1, 3, 6, 0x02, 0x2B, 0x00, 0x00, 0x00, 0x64});
  EXPECT_THAT(answer.words, ElementsAre(555, 0, 100));
}

TEST(TcpAnswer, HasTheCoilsOfThePublishedPduOneAWord) {
  const BlockAnswer answer =
      tcp_answer(nineteen_coils, 7, Bytes{0, 7, 0, 0, 0, 6, 1, 1, 3, 0xCD, 0x6B, 0x05});
  EXPECT_THAT(answer.words, ElementsAre(1, 0, 1, 1, 0, 0, 1, 1, 1, 1, 0, 1, 0, 1, 1, 0, 1, 0, 1));
}

TEST(TcpAnswer, TellsTheExceptionAndItsCode) {
  const BlockAnswer answer = tcp_answer(three_registers, 7, Bytes{0, 7, 0, 0, 0, 3, 1, 0x83, 2});
  EXPECT_EQ(answer.failure, BusFailure::exception);
  EXPECT_EQ(answer.exception_code, 2);
}

struct WrongFrame {
  std::string_view label;
  Bytes frame;
};

class WrongTcpAnswer : public testing::TestWithParam<WrongFrame> {};

TEST_P(WrongTcpAnswer, IsMalformed) {
  const BlockAnswer answer = tcp_answer(one_register, 7, GetParam().frame);
  EXPECT_EQ(answer.failure, BusFailure::malformed);
  EXPECT_TRUE(answer.words.empty());
}

INSTANTIATE_TEST_SUITE_P(Each, WrongTcpAnswer,
                         testing::Values(
                             WrongFrame{
                                 "transaction", {0, 8, 0, 0, 0, 5, 0xFF, 3, 2, 0, 5}
},
                             WrongFrame{"protocol", {0, 7, 0, 1, 0, 5, 0xFF, 3, 2, 0, 5}},
                             WrongFrame{"length", {0, 7, 0, 0, 0, 6, 0xFF, 3, 2, 0, 5}},
                             WrongFrame{"unit", {0, 7, 0, 0, 0, 5, 0x01, 3, 2, 0, 5}},
                             WrongFrame{"function", {0, 7, 0, 0, 0, 5, 0xFF, 4, 2, 0, 5}},
                             WrongFrame{"other_exception", {0, 7, 0, 0, 0, 3, 0xFF, 0x84, 2}},
                             WrongFrame{"byte_count", {0, 7, 0, 0, 0, 5, 0xFF, 3, 1, 0, 5}},
                             WrongFrame{"too_many", {0, 7, 0, 0, 0, 7, 0xFF, 3, 4, 0, 5, 0, 6}},
                             WrongFrame{"trailing_byte", {0, 7, 0, 0, 0, 5, 0xFF, 3, 2, 0, 5, 0}},
                             WrongFrame{"cut", {0, 7, 0, 0, 0, 5, 0xFF, 3, 2, 0}},
                             WrongFrame{"header_only", {0, 7, 0, 0, 0, 5, 0xFF}},
                             WrongFrame{"empty", {}}),
                         [](const auto& tested) { return std::string{tested.param.label}; });

// The check value 0x4B37 of "123456789" under this polynomial, start and reflection is listed in
// catalogues of cyclic redundancy checks (from memory).
TEST(ModbusCrc, HasTheListedCheckValue) {
  EXPECT_EQ(modbus_crc(Bytes{'1', '2', '3', '4', '5', '6', '7', '8', '9'}), 0x4B37);
}

TEST(RtuRequest, EndsWithTheCrcLowByteFirst) {
  const BlockRequest ten{.unit = 1, .table = Table::holding, .address = 0, .count = 10};
  EXPECT_THAT(rtu_request(ten), ElementsAre(1, 3, 0, 0, 0, 10, 0xC5, 0xCD));  // from memory
}

TEST(RtuAnswer, HasTheRegistersOfThePublishedPdu) {
  const BlockAnswer answer =
      rtu_answer(three_registers, with_crc({1, 3, 6, 0x02, 0x2B, 0x00, 0x00, 0x00, 0x64}));
  EXPECT_THAT(answer.words, ElementsAre(555, 0, 100));
}

TEST(RtuAnswer, TellsTheExceptionAndItsCode) {
  EXPECT_EQ(rtu_answer(three_registers, with_crc({1, 0x83, 4})).exception_code, 4);
}

TEST(RtuAnswer, RefusesABadCrcAWrongSlaveAndTheEchoOfTheRequest) {
  Bytes bad = with_crc({1, 3, 6, 0x02, 0x2B, 0x00, 0x00, 0x00, 0x64});
  bad[4] ^= 1U;
  EXPECT_EQ(rtu_answer(three_registers, bad).failure, BusFailure::malformed);
  EXPECT_EQ(rtu_answer(three_registers, with_crc({2, 3, 6, 0, 1, 0, 2, 0, 3})).failure,
            BusFailure::malformed);
  EXPECT_EQ(rtu_answer(three_registers, rtu_request(three_registers)).failure,
            BusFailure::malformed);
  EXPECT_EQ(rtu_answer(three_registers, Bytes{1, 3}).failure, BusFailure::malformed);
}

TEST(FunctionCode, IsOneOfTheFourThatRead) {
  EXPECT_EQ(function_code(Table::coil), 1);
  EXPECT_EQ(function_code(Table::discrete), 2);
  EXPECT_EQ(function_code(Table::holding), 3);
  EXPECT_EQ(function_code(Table::input), 4);
}

}  // namespace
}  // namespace lostwork
