#include "daemon/advance.h"
#include "tests/daemon/step_run.h"

#include <random>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using Bytes = std::vector<std::uint8_t>;
using testing::HasSubstr;

class StoredState : public testing::Test {
 protected:
  StoredState() {
    test::Outcome outcome;
    test::StepRun run{11};
    model = run.model();
    test::play(model, run.scans(700), outcome);
    bytes = save(outcome.state);
  }
  StepModel model;
  Bytes bytes;
};

TEST_F(StoredState, IsTheSameAfterBeingTakenUp) {
  const auto state = load(model, bytes);
  ASSERT_TRUE(state) << state.error();
  EXPECT_EQ(save(*state), bytes);
}

TEST_F(StoredState, IsRefusedAtEveryShorterLength) {
  for (std::size_t size = 0; size < bytes.size(); size += size < 64 ? 1 : 97) {
    EXPECT_FALSE(load(model, Bytes(bytes.begin(), bytes.begin() + static_cast<int>(size)))) << size;
  }
}

TEST_F(StoredState, IsRefusedWithAnyChangedByte) {
  std::mt19937_64 random{1};
  for (int i = 0; i < 2000; ++i) {
    Bytes changed = bytes;
    const std::size_t at = i < 16 ? static_cast<std::size_t>(i) : random() % bytes.size();
    changed[at] = static_cast<std::uint8_t>(changed[at] ^ (1 + random() % 255));
    EXPECT_FALSE(load(model, changed)) << "byte " << at;
  }
}

TEST_F(StoredState, IsRefusedWithMoreBytes) {
  bytes.push_back(0);
  EXPECT_FALSE(load(model, bytes));
}

TEST_F(StoredState, OfAnotherVersionIsNamedSo) {
  bytes[4] = static_cast<std::uint8_t>(bytes[4] + 1);
  const auto state = load(model, bytes);
  ASSERT_FALSE(state);
  EXPECT_THAT(state.error(), HasSubstr("another version"));
}

TEST_F(StoredState, OfSomethingElseIsNamedSo) {
  const auto state = load(model, Bytes(1000, 0x42));
  ASSERT_FALSE(state);
  EXPECT_THAT(state.error(), HasSubstr("not the state of a machine"));
}

TEST_F(StoredState, DamagedIsNamedSo) {
  bytes.back() = static_cast<std::uint8_t>(bytes.back() + 1);
  const auto state = load(model, bytes);
  ASSERT_FALSE(state);
  EXPECT_THAT(state.error(), HasSubstr("damaged"));
}

TEST_F(StoredState, OfAFreshMachineIsTakenUpToo) {
  EXPECT_TRUE(load(model, save(MachineState{})));
}

}  // namespace
}  // namespace lostwork
