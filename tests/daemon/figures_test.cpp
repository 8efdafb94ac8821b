#include "daemon/figures.h"

#include <limits>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

struct Case {
  Measured value;
  int decimals;
};

class DecimalsOfAFigure : public testing::TestWithParam<Case> {};

TEST_P(DecimalsOfAFigure, FollowItsInterval) {
  EXPECT_EQ(decimals(GetParam().value), GetParam().decimals);
}

INSTANTIATE_TEST_SUITE_P(Of, DecimalsOfAFigure,
                         testing::Values(
                             Case{
                                 {.value = 27.43, .u = 0.55},
                                 1
},     // U = 1.1
                             Case{{.value = 27.43, .u = 0.20}, 1},    // U = 0.40: one digit
                             Case{{.value = 27.43, .u = 0.14}, 2},    // U = 0.28: two digits
                             Case{{.value = 27.43, .u = 0.0498}, 2},  // U = 0.0996, that is 0.10
                             Case{{.value = 1234.0, .u = 60.0}, 0},   // U = 120
                             Case{{.value = 0.433, .u = 0.008}, 3},   // U = 0.016
                             Case{{.value = 1.0, .u = 1e-9}, 6},      // never more than six
                             Case{{.value = 59.4, .u = 0.0}, 2},  // four digits where none is known
                             Case{{.value = 123456.0, .u = 0.0}, 0},
                             Case{{.value = 0.0, .u = 0.0}, 3}));

TEST(Fixed, HasNoNegativeZero) {
  EXPECT_EQ(fixed(-0.04, 1), "0.0");
}

TEST(Fixed, KeepsTheSignOfWhatIsLeft) {
  EXPECT_EQ(fixed(-0.06, 1), "-0.1");
}

TEST(Fixed, HoldsTheLargestNumber) {
  EXPECT_EQ(fixed(std::numeric_limits<double>::max(), 6).size(), 309U + 7U);
}

TEST(WithInterval, ShowsTwiceTheStandardUncertainty) {
  EXPECT_EQ(with_interval({.value = 27.43, .u = 0.55}, "kW"), "27.4 kW \u00b1 1.1 kW (95 %)");
}

TEST(WithInterval, LeavesOutTheUnitOne) {
  EXPECT_EQ(with_interval({.value = 0.4327, .u = 0.008}, "1"), "0.433 \u00b1 0.016 (95 %)");
}

TEST(WithInterval, SaysNoIntervalWhereNoneIsKnown) {
  EXPECT_EQ(with_interval({.value = 12.0, .u = 0.0}, "kW"), "12.00 kW");
}

}  // namespace
}  // namespace lostwork
