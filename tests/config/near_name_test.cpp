#include "config/near_name.h"

#include "config/plant_keys.h"

#include <ostream>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

struct Slip {
  const char* name;
  const char* written;
  const char* meant;
};
void PrintTo(const Slip& slip, std::ostream* out) {
  *out << slip.written << " for " << slip.meant;
}

class IsSlipOf : public ::testing::TestWithParam<Slip> {};

TEST_P(IsSlipOf, SeesWhatWasMeant) {
  EXPECT_TRUE(is_slip_of(GetParam().written, GetParam().meant));
}

INSTANTIATE_TEST_SUITE_P(Names, IsSlipOf,
                         ::testing::Values(Slip{"TwoLettersSwapped", "regsiter", "register"},
                                           Slip{"OneLeftOut", "lisen", "listen"},
                                           Slip{"OneTooMany", "unnit", "unit"},
                                           Slip{"OneChanged", "rple", "role"},
                                           Slip{"OtherCase", "ID", "id"}),
                         [](const auto& param) { return std::string{param.param.name}; });

class IsNoSlipOf : public ::testing::TestWithParam<Slip> {};

TEST_P(IsNoSlipOf, LeavesOtherNamesAlone) {
  EXPECT_FALSE(is_slip_of(GetParam().written, GetParam().meant));
}

INSTANTIATE_TEST_SUITE_P(Names, IsNoSlipOf,
                         ::testing::Values(Slip{"TheNameItself", "unit", "unit"},
                                           Slip{"AShortName", "u", "id"},
                                           Slip{"WrongInTwoPlaces", "ragistar", "register"},
                                           Slip{"AnotherName", "comment", "offset"},
                                           Slip{"ALongerName", "registers_of_it", "register"}),
                         [](const auto& param) { return std::string{param.param.name}; });

TEST(IsSlipOfAmongKeys, NoKeyOfTheFileIsTakenForAnotherOfItsTable) {
  const auto rows = keys::all();
  for (const KeyRow& a : rows) {
    for (const KeyRow& b : rows) {
      EXPECT_FALSE(a.table == b.table && is_slip_of(a.key, b.key)) << a.key << ", " << b.key;
    }
  }
}

}  // namespace
}  // namespace lostwork
