#include "sensors/blocks.h"

#include <algorithm>
#include <limits>
#include <numeric>
#include <tuple>

namespace lostwork {
namespace {

// Address after the last one.
std::uint32_t end_of(const RegisterNeed& need) {
  return std::uint32_t{need.address} + need.count;
}

// What the limits are for one table.
struct Limits {
  std::uint32_t most;
  std::uint32_t gap;
  double request_cost;
  double unit_cost;  // of a register or a bit
};

Limits limits(Table table, const BlockRules& rules) {
  const bool bitwise = holds_bits(table);
  return {.most = bitwise ? rules.max_bits : rules.max_registers,
          .gap = bitwise ? 16U * rules.max_gap : rules.max_gap,
          .request_cost = rules.request_cost,
          .unit_cost = bitwise ? rules.word_cost / 16 : rules.word_cost};
}

// The best plan for the first n needs: its cost, and where its last block begins.
struct Best {
  double cost = std::numeric_limits<double>::infinity();
  std::size_t first = 0;
};

bool cheaper(const Best& a, const Best& b) {
  return a.cost < b.cost;
}

// How many of the ordered needs from `first` on can be in one block, and where each such block
// ends.
std::vector<std::uint32_t> ends_of_blocks(std::span<const RegisterNeed> needs,
                                          std::span<const std::size_t> order, const Limits& limit) {
  const std::uint32_t start = needs[order.front()].address;
  std::vector<std::uint32_t> ends{end_of(needs[order.front()])};
  for (const std::size_t i : order.subspan(1)) {
    const std::uint32_t end = std::max(ends.back(), end_of(needs[i]));
    if (needs[i].address > ends.back() + limit.gap || end - start > limit.most) {
      break;
    }
    ends.push_back(end);
  }
  return ends;
}

// Dynamic programming over the needs of one table by rising address: a block takes neighbours.
std::vector<Best> best_plans(std::span<const RegisterNeed> needs,
                             std::span<const std::size_t> order, const Limits& limit) {
  std::vector<Best> best(order.size() + 1);
  best[0].cost = 0.0;
  for (std::size_t first = 0; first < order.size(); ++first) {
    std::size_t after = first;
    for (const std::uint32_t end : ends_of_blocks(needs, order.subspan(first), limit)) {
      const std::uint32_t size = end - needs[order[first]].address;
      const Best next{.cost = best[first].cost + limit.request_cost + limit.unit_cost * size,
                      .first = first};
      ++after;
      best[after] = std::min(best[after], next, cheaper);
    }
  }
  return best;
}

void append_blocks(std::vector<Block>& blocks, std::span<const RegisterNeed> needs,
                   const std::vector<std::size_t>& order, const BlockRules& rules) {
  const std::vector<Best> best =
      best_plans(needs, order, limits(needs[order.front()].table, rules));
  const std::size_t before = blocks.size();
  for (std::size_t n = order.size(); n > 0; n = best[n].first) {
    const auto from = order.begin() + static_cast<std::ptrdiff_t>(best[n].first);
    blocks.push_back(block_around(needs, {from, order.begin() + static_cast<std::ptrdiff_t>(n)}));
  }
  std::reverse(blocks.begin() + static_cast<std::ptrdiff_t>(before), blocks.end());
}

}  // namespace

std::vector<Block> blocks_of(std::span<const RegisterNeed> needs, const BlockRules& rules) {
  std::vector<std::size_t> order(needs.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  std::sort(order.begin(), order.end(), [needs](std::size_t a, std::size_t b) {
    return std::tuple{needs[a].table, needs[a].address, end_of(needs[a]), a} <
           std::tuple{needs[b].table, needs[b].address, end_of(needs[b]), b};
  });
  std::vector<Block> blocks;
  for (auto from = order.begin(); from != order.end();) {
    const Table table = needs[*from].table;
    const auto to = std::find_if(from, order.end(),
                                 [needs, table](std::size_t i) { return needs[i].table != table; });
    append_blocks(blocks, needs, {from, to}, rules);
    from = to;
  }
  return blocks;
}

Block block_around(std::span<const RegisterNeed> needs, std::vector<std::size_t> which) {
  const Table table = needs[which.front()].table;
  std::uint32_t start = needs[which.front()].address;
  std::uint32_t end = start;
  for (const std::size_t i : which) {
    start = std::min<std::uint32_t>(start, needs[i].address);
    end = std::max(end, end_of(needs[i]));
  }
  return {.table = table,
          .address = static_cast<std::uint16_t>(start),
          .count = static_cast<std::uint16_t>(end - start),
          .needs = std::move(which)};
}

}  // namespace lostwork
