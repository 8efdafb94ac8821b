#include "thermo/quantity.h"

#include <gtest/gtest.h>

namespace lostwork {
namespace {

class EveryQuantity : public testing::TestWithParam<std::size_t> {};

TEST_P(EveryQuantity, HasAWeightExactlyIfItIsARatio) {
  const auto quantity = static_cast<Quantity>(GetParam());
  EXPECT_EQ(weight_of(quantity).has_value(), info(quantity).kind == QuantityKind::ratio);
}

INSTANTIATE_TEST_SUITE_P(Table, EveryQuantity, testing::Range(std::size_t{0}, quantity_count),
                         [](const testing::TestParamInfo<std::size_t>& quantity) {
                           return std::string{quantities()[quantity.param].name};
                         });

}  // namespace
}  // namespace lostwork
