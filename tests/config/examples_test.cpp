#include "config/plant_config.h"
#include "tests/config/problem_printer.h"

#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

class Example : public ::testing::TestWithParam<const char*> {};

TEST_P(Example, IsAGoodPlantFile) {
  const auto plant = load_plant(std::string{LOSTWORK_SOURCE} + "/config/examples/" + GetParam());
  ASSERT_TRUE(plant) << ::testing::PrintToString(plant.error());
}

INSTANTIATE_TEST_SUITE_P(Files, Example,
                         ::testing::Values("first_machine.toml", "tern_quay_dairy.toml"),
                         [](const auto& param) {
                           return std::string{param.param}.substr(
                               0, std::string{param.param}.find('.'));
                         });

}  // namespace
}  // namespace lostwork
