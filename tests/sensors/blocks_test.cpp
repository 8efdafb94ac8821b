#include "sensors/blocks.h"

#include <algorithm>
#include <limits>
#include <random>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::UnorderedElementsAre;

double cost_of(const std::vector<Block>& blocks, const BlockRules& rules) {
  double cost = 0.0;
  for (const Block& block : blocks) {
    const double unit = holds_bits(block.table) ? rules.word_cost / 16 : rules.word_cost;
    cost += rules.request_cost + unit * block.count;
  }
  return cost;
}

// Whether these needs may share a request, by the words of the header.
bool may_share(const std::vector<RegisterNeed>& needs, std::vector<std::size_t> which,
               const BlockRules& rules) {
  std::sort(which.begin(), which.end(),
            [&needs](std::size_t a, std::size_t b) { return needs[a].address < needs[b].address; });
  int end = needs[which[0]].address;
  for (const std::size_t i : which) {
    if (needs[i].address > end + rules.max_gap) {
      return false;
    }
    end = std::max(end, needs[i].address + needs[i].count);
  }
  return which.size() == 1 || end - needs[which[0]].address <= rules.max_registers;
}

// Tries every way to put the needs from `next` on into groups.
double least_cost(const std::vector<RegisterNeed>& needs, const BlockRules& rules,
                  std::vector<std::vector<std::size_t>>& groups, std::size_t next) {
  if (next == needs.size()) {
    std::vector<Block> blocks;
    for (const auto& group : groups) {
      if (!may_share(needs, group, rules)) {
        return std::numeric_limits<double>::infinity();
      }
      blocks.push_back(block_around(needs, group));
    }
    return cost_of(blocks, rules);
  }
  double least = std::numeric_limits<double>::infinity();
  for (std::size_t g = 0; g < groups.size(); ++g) {
    groups[g].push_back(next);
    least = std::min(least, least_cost(needs, rules, groups, next + 1));
    groups[g].pop_back();
  }
  groups.push_back({next});
  least = std::min(least, least_cost(needs, rules, groups, next + 1));
  groups.pop_back();
  return least;
}

class RandomMap : public testing::TestWithParam<unsigned> {};

TEST_P(RandomMap, IsReadAsCheaplyAsTheBestOfAllPartitions) {
  SCOPED_TRACE(GetParam());
  std::mt19937 random{GetParam()};
  const auto draw = [&random](int from, int to) {
    return std::uniform_int_distribution{from, to}(random);
  };
  const BlockRules rules{.max_registers = static_cast<std::uint16_t>(draw(4, 30)),
                         .max_gap = static_cast<std::uint16_t>(draw(0, 12)),
                         .request_cost = 1.0,
                         .word_cost = draw(0, 1) == 0 ? 1e-6 : 0.1};
  std::vector<RegisterNeed> needs(static_cast<std::size_t>(draw(1, 8)));
  for (RegisterNeed& need : needs) {
    need.address = static_cast<std::uint16_t>(draw(0, 60));
    need.count = static_cast<std::uint16_t>(draw(1, 2));
  }
  std::vector<std::vector<std::size_t>> groups;
  // Sums of at most eight terms of about 1, in two orders.
  EXPECT_NEAR(cost_of(blocks_of(needs, rules), rules), least_cost(needs, rules, groups, 0), 1e-12);
}

INSTANTIATE_TEST_SUITE_P(Seeds, RandomMap, testing::Range(1U, 41U));

TEST(BlocksOf, AFullTableAreAsFewAsTheLimitAllows) {
  std::vector<RegisterNeed> needs;
  for (int i = 0; i < 250; ++i) {
    needs.push_back({.address = static_cast<std::uint16_t>(i)});
  }
  const auto blocks = blocks_of(needs, {});
  ASSERT_EQ(blocks.size(), 2U);
  EXPECT_EQ(blocks[0].count, 125);
  EXPECT_EQ(blocks[1].count, 125);
}

TEST(BlocksOf, NeverCutAValueOfTwoWords) {
  std::vector<RegisterNeed> needs;
  for (int i = 0; i < 100; ++i) {
    needs.push_back({.address = static_cast<std::uint16_t>(2 * i), .count = 2});
  }
  for (const Block& block : blocks_of(needs, {})) {
    EXPECT_LE(block.count, 125);
    EXPECT_EQ(block.count % 2, 0);
  }
}

TEST(BlocksOf, JoinOverAGapUpToTheLimitAndNotBeyond) {
  const std::vector<RegisterNeed> near{{.address = 0}, {.address = 11}};
  const std::vector<RegisterNeed> far{{.address = 0}, {.address = 12}};
  EXPECT_EQ(blocks_of(near, {}).size(), 1U);
  EXPECT_EQ(blocks_of(far, {}).size(), 2U);
}

TEST(BlocksOf, KeepTheTablesApart) {
  const std::vector<RegisterNeed> needs{
      {  .table = Table::input, .address = 0},
      {.table = Table::holding, .address = 1},
      {   .table = Table::coil, .address = 0},
      {  .table = Table::input, .address = 1}
  };
  std::vector<std::vector<std::size_t>> members;
  for (const Block& block : blocks_of(needs, {})) {
    members.push_back(block.needs);
  }
  EXPECT_THAT(members,
              UnorderedElementsAre(std::vector<std::size_t>{0, 3}, std::vector<std::size_t>{1},
                                   std::vector<std::size_t>{2}));
}

TEST(BlocksOf, ReadTwoThousandBitsAtOnce) {
  std::vector<RegisterNeed> needs;
  for (int i = 0; i < 2001; ++i) {
    needs.push_back({.table = Table::discrete, .address = static_cast<std::uint16_t>(i)});
  }
  EXPECT_EQ(blocks_of(needs, {}).size(), 2U);
}

TEST(BlocksOf, HoldEveryNeedOnceEvenWhereTwoAreTheSame) {
  const std::vector<RegisterNeed> needs{{.address = 5}, {.address = 5}, {.address = 65535}};
  const auto blocks = blocks_of(needs, {});
  ASSERT_EQ(blocks.size(), 2U);
  EXPECT_THAT(blocks[0].needs, UnorderedElementsAre(0, 1));
  EXPECT_EQ(blocks[0].count, 1);
  EXPECT_EQ(blocks[1].address, 65535);
}

TEST(BlocksOf, NoNeedsAreNone) {
  EXPECT_TRUE(blocks_of({}, {}).empty());
}

}  // namespace
}  // namespace lostwork
