// Expected numbers: IEEE 754 binary32 and two's complement worked out by hand.
#include "sensors/decode.h"

#include <cmath>
#include <limits>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using Words = std::vector<std::uint16_t>;

struct NumberCase {
  const char* label;
  RawType type;
  ByteOrder order;
  Words words;
  double value;
};

class DecodedNumber : public testing::TestWithParam<NumberCase> {};

TEST_P(DecodedNumber, IsTheOneWorkedOutByHand) {
  const NumberCase& c = GetParam();
  const RegisterSpec spec{.type = c.type, .order = c.order};
  const auto value = decode(spec, c.words);
  ASSERT_TRUE(value.has_value());
  EXPECT_EQ(*value, c.value);
}

// 0x12345678 = 305419896. 0x41460000: sign 0, exponent 130 - 127 = 3, 1.546875 * 8 = 12.375.
INSTANTIATE_TEST_SUITE_P(
    ByHand, DecodedNumber,
    testing::Values(
        NumberCase{
            "u16_largest", RawType::u16, ByteOrder::abcd, {0xFFFF},
               65535
},
        NumberCase{"s16_minus_one", RawType::s16, ByteOrder::abcd, {0xFFFF}, -1},
        NumberCase{"s16_least", RawType::s16, ByteOrder::abcd, {0x8000}, -32768},
        NumberCase{"s16_largest", RawType::s16, ByteOrder::abcd, {0x7FFF}, 32767},
        NumberCase{"u16_with_its_bytes_swapped", RawType::u16, ByteOrder::badc, {0x3412}, 0x1234},
        NumberCase{"u16_with_its_words_swapped", RawType::u16, ByteOrder::cdab, {0x1234}, 0x1234},
        NumberCase{"u32_abcd", RawType::u32, ByteOrder::abcd, {0x1234, 0x5678}, 305419896},
        NumberCase{"u32_cdab", RawType::u32, ByteOrder::cdab, {0x5678, 0x1234}, 305419896},
        NumberCase{"u32_badc", RawType::u32, ByteOrder::badc, {0x3412, 0x7856}, 305419896},
        NumberCase{"u32_dcba", RawType::u32, ByteOrder::dcba, {0x7856, 0x3412}, 305419896},
        NumberCase{"u32_largest", RawType::u32, ByteOrder::abcd, {0xFFFF, 0xFFFF}, 4294967295.0},
        NumberCase{"s32_minus_two", RawType::s32, ByteOrder::abcd, {0xFFFF, 0xFFFE}, -2},
        NumberCase{"s32_least", RawType::s32, ByteOrder::cdab, {0x0000, 0x8000}, -2147483648.0},
        NumberCase{"f32_one", RawType::f32, ByteOrder::abcd, {0x3F80, 0x0000}, 1.0},
        NumberCase{"f32_abcd", RawType::f32, ByteOrder::abcd, {0x4146, 0x0000}, 12.375},
        NumberCase{"f32_cdab", RawType::f32, ByteOrder::cdab, {0x0000, 0x4146}, 12.375},
        NumberCase{"f32_badc", RawType::f32, ByteOrder::badc, {0x4641, 0x0000}, 12.375},
        NumberCase{"f32_dcba", RawType::f32, ByteOrder::dcba, {0x0000, 0x4641}, 12.375},
        NumberCase{"f32_negative", RawType::f32, ByteOrder::abcd, {0xC000, 0x0000}, -2.0},
        NumberCase{"f32_minus_zero", RawType::f32, ByteOrder::abcd, {0x8000, 0x0000}, 0.0},
        NumberCase{"bit_set", RawType::bit, ByteOrder::abcd, {1}, 1.0},
        NumberCase{"bit_clear", RawType::bit, ByteOrder::dcba, {0}, 0.0}),
    [](const auto& tested) { return std::string{tested.param.label}; });

TEST(Decode, AppliesScaleAndThenOffset) {
  const RegisterSpec spec{.type = RawType::s16, .scale = 0.5, .offset = -10.0};
  EXPECT_EQ(decode(spec, Words{0xFFFC}), -12.0);
}

TEST(Decode, TestsSentinelsOnTheRawPatternBeforeScaling) {
  const RegisterSpec spec{
      .type = RawType::s16, .scale = 0.1, .sentinels = {0x8000, 0x7FFF}
  };
  EXPECT_EQ(decode(spec, Words{0x8000}).error(), Quality::sentinel);
  EXPECT_EQ(decode(spec, Words{0x7FFF}).error(), Quality::sentinel);
  EXPECT_TRUE(decode(spec, Words{0x7FFE}).has_value());
}

TEST(Decode, TestsSentinelsOf32BitsInTheOrderOfTheValue) {
  const RegisterSpec spec{
      .type = RawType::u32, .order = ByteOrder::cdab, .sentinels = {0x7FFFFFFF}};
  EXPECT_EQ(decode(spec, Words{0xFFFF, 0x7FFF}).error(), Quality::sentinel);
}

TEST(Decode, KnowsASentinelThatIsNoNumber) {
  const RegisterSpec spec{.type = RawType::f32, .sentinels = {0x7FC00000}};
  EXPECT_EQ(decode(spec, Words{0x7FC0, 0x0000}).error(), Quality::sentinel);
}

struct NoNumberCase {
  const char* label;
  Words words;
};

class NoNumber : public testing::TestWithParam<NoNumberCase> {};

TEST_P(NoNumber, IsOutOfRange) {
  EXPECT_EQ(decode({.type = RawType::f32}, GetParam().words).error(), Quality::out_of_range);
}

// 0x00003F80 is 1.0 with its words swapped: 16256 * 2^-149 = 2.3e-41.
INSTANTIATE_TEST_SUITE_P(Floats, NoNumber,
                         testing::Values(
                             NoNumberCase{
                                 "quiet_nan", {0x7FC0, 0x0000}
},
                             NoNumberCase{"signalling_nan", {0x7F80, 0x0001}},
                             NoNumberCase{"negative_nan", {0xFFFF, 0xFFFF}},
                             NoNumberCase{"infinity", {0x7F80, 0x0000}},
                             NoNumberCase{"minus_infinity", {0xFF80, 0x0000}},
                             NoNumberCase{"words_swapped", {0x0000, 0x3F80}}),
                         [](const auto& tested) { return std::string{tested.param.label}; });

TEST(Decode, RefusesTooFewWords) {
  EXPECT_EQ(decode({.type = RawType::u32}, Words{1}).error(), Quality::out_of_range);
  EXPECT_EQ(decode({.type = RawType::u16}, Words{}).error(), Quality::out_of_range);
}

TEST(Decode, RefusesAValueThatScalingMakesInfinite) {
  const RegisterSpec spec{.type = RawType::u16, .scale = 1e308};
  EXPECT_EQ(decode(spec, Words{100}).error(), Quality::out_of_range);
}

struct AddressCase {
  Notation notation;
  Table table;
  std::int64_t printed;
  int wire;  // -1: refused
};

class WireAddress : public testing::TestWithParam<AddressCase> {};

TEST_P(WireAddress, FollowsTheNotationOfTheDocument) {
  const AddressCase& c = GetParam();
  const auto wire = wire_address(c.notation, c.table, c.printed);
  EXPECT_EQ(wire.map([](std::uint16_t a) { return int{a}; }).value_or(-1), c.wire);
}

// MODBUS Application Protocol V1.1b3, 4.4: register 1 is address 0. The leading digit of the table
// (0, 1, 3, 4) and five or six digits: common practice, no source.
INSTANTIATE_TEST_SUITE_P(
    Notations, WireAddress,
    testing::Values(AddressCase{Notation::zero_based, Table::holding, 0, 0},
                    AddressCase{Notation::zero_based, Table::holding, 65535, 65535},
                    AddressCase{Notation::zero_based, Table::holding, 65536, -1},
                    AddressCase{Notation::zero_based, Table::holding, -1, -1},
                    AddressCase{Notation::one_based, Table::input, 1, 0},
                    AddressCase{Notation::one_based, Table::input, 65536, 65535},
                    AddressCase{Notation::one_based, Table::input, 0, -1},
                    AddressCase{Notation::modicon, Table::holding, 40001, 0},
                    AddressCase{Notation::modicon, Table::holding, 40108, 107},
                    AddressCase{Notation::modicon, Table::holding, 49999, 9998},
                    AddressCase{Notation::modicon, Table::holding, 400001, 0},
                    AddressCase{Notation::modicon, Table::holding, 465536, 65535},
                    AddressCase{Notation::modicon, Table::holding, 30001, -1},
                    AddressCase{Notation::modicon, Table::holding, 100, -1},
                    AddressCase{Notation::modicon, Table::input, 30001, 0},
                    AddressCase{Notation::modicon, Table::input, 365536, 65535},
                    AddressCase{Notation::modicon, Table::input, 40001, -1},
                    AddressCase{Notation::modicon, Table::discrete, 10001, 0},
                    AddressCase{Notation::modicon, Table::coil, 1, 0},
                    AddressCase{Notation::modicon, Table::coil, 0, -1}),
    [](const auto& tested) { return "Row" + std::to_string(tested.index); });

TEST(WireAddressError, NamesTheRegisterAndWhatIsAllowed) {
  const auto wire = wire_address(Notation::modicon, Table::holding, 30001);
  EXPECT_EQ(wire.error(),
            "register 30001 is not in the table holding in the notation modicon: 40001 to 49999 or "
            "400001 to 465536");
}

TEST(BitPattern, TakesWhatFitsTheType) {
  EXPECT_EQ(bit_pattern(RawType::s16, std::int64_t{0x8000}), 0x8000U);
  EXPECT_EQ(bit_pattern(RawType::s16, std::int64_t{-3000}), 0xF448U);
  EXPECT_EQ(bit_pattern(RawType::u16, std::int64_t{65535}), 0xFFFFU);
  EXPECT_EQ(bit_pattern(RawType::s32, std::int64_t{-1}), 0xFFFFFFFFU);
  EXPECT_EQ(bit_pattern(RawType::f32, std::int64_t{0x7FC00000}), 0x7FC00000U);
  EXPECT_EQ(bit_pattern(RawType::f32, 1.0), 0x3F800000U);
}

TEST(BitPattern, RefusesWhatDoesNotFit) {
  EXPECT_EQ(bit_pattern(RawType::u16, std::int64_t{-1}), std::nullopt);
  EXPECT_EQ(bit_pattern(RawType::u16, std::int64_t{65536}), std::nullopt);
  EXPECT_EQ(bit_pattern(RawType::s16, std::int64_t{-32769}), std::nullopt);
  EXPECT_EQ(bit_pattern(RawType::u32, std::int64_t{4294967296}), std::nullopt);
  EXPECT_EQ(bit_pattern(RawType::u16, 1.5), std::nullopt);
  EXPECT_EQ(bit_pattern(RawType::f32, 1e300), std::nullopt);
  EXPECT_EQ(bit_pattern(RawType::f32, std::numeric_limits<double>::quiet_NaN()), std::nullopt);
}

TEST(FaultOfRegister, FindsAValueThatCannotBeThere) {
  EXPECT_EQ(fault_of({}), std::nullopt);
  EXPECT_TRUE(fault_of({.table = Table::coil, .type = RawType::u16}).has_value());
  EXPECT_TRUE(fault_of({.table = Table::holding, .type = RawType::bit}).has_value());
  EXPECT_TRUE(fault_of({.address = 65535, .type = RawType::f32}).has_value());
  EXPECT_EQ(fault_of({.address = 65534, .type = RawType::f32}), std::nullopt);
  EXPECT_TRUE(fault_of({.scale = 0.0}).has_value());
  EXPECT_TRUE(fault_of({.scale = std::numeric_limits<double>::infinity()}).has_value());
  EXPECT_TRUE(fault_of({.offset = std::numeric_limits<double>::quiet_NaN()}).has_value());
}

TEST(NamesOfRegisters, AreThoseOfThePlantFile) {
  EXPECT_EQ(table_named("discrete"), Table::discrete);
  EXPECT_EQ(raw_type_named("f32"), RawType::f32);
  EXPECT_EQ(byte_order_named("CDAB"), ByteOrder::cdab);
  EXPECT_EQ(notation_named("modicon"), Notation::modicon);
  EXPECT_EQ(name(Table::input), "input");
  EXPECT_EQ(name(ByteOrder::dcba), "DCBA");
  EXPECT_EQ(byte_order_named("abcd"), std::nullopt);
}

}  // namespace
}  // namespace lostwork
