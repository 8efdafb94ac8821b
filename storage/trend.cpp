#include "storage/trend.h"

#include "storage/key.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <cstdint>

namespace lostwork {
namespace {

constexpr std::array widths{minute,      2 * minute, 5 * minute, 10 * minute, 15 * minute,
                            30 * minute, hour,       2 * hour,   3 * hour,    4 * hour,
                            6 * hour,    12 * hour,  day,        2 * day,     5 * day,
                            10 * day,    20 * day,   50 * day,   100 * day};

std::size_t count_of(Span width, Instant from, Instant to) {
  return static_cast<std::size_t>((to - begin_of(width, from) + width - Span{1}) / width);
}

Span width_of(Instant from, Instant to, std::size_t max_points) {
  for (const Span width : widths) {
    if (count_of(width, from, to) <= max_points) {
      return width;
    }
  }
  // Ends at the latest where one bucket begins in 1970 and holds all.
  Span width = widths.back();
  while (count_of(width, from, to) > max_points) {
    width *= 2;
  }
  return width;
}

Span source_of(Span width) {
  if (width % day == Span{0}) {
    return day;
  }
  return width % hour == Span{0} ? hour : minute;
}

struct Joined {
  QuantitySums sums;
  Instant newest{};
  double covered_ms = 0.0;
};

void join(Joined& into, const QuantityPeriod& period) {
  const QuantitySums& from = period.sums;
  if (from.count == 0) {
    if (into.sums.count == 0 && period.begin >= into.newest) {
      into.sums.reason = from.reason;
      into.newest = period.begin;
    }
    return;
  }
  QuantitySums& sums = into.sums;
  sums.min = sums.count == 0 ? from.min : std::min(sums.min, from.min);
  sums.max = sums.count == 0 ? from.max : std::max(sums.max, from.max);
  sums.sum += from.sum;
  sums.u_sum += from.u_sum;
  sums.weight += from.weight;
  sums.count += from.count;
  into.covered_ms += static_cast<double>(period.covered_ms) * static_cast<double>(from.count) /
                     static_cast<double>(period.scans);
}

}  // namespace

BucketPlan plan_of(Instant from, Instant to, std::size_t max_points) {
  const Span width = width_of(from, to, max_points);
  return {.width = width,
          .source = source_of(width),
          .begin = begin_of(width, from),
          .count = count_of(width, from, to)};
}

std::vector<Bucket> buckets_of(const BucketPlan& plan, std::span<const QuantityPeriod> periods) {
  std::vector<Joined> joined(plan.count);
  for (const QuantityPeriod& period : periods) {
    const auto place = (period.begin - plan.begin) / plan.width;
    if (period.begin >= plan.begin && static_cast<std::size_t>(place) < plan.count) {
      join(joined[static_cast<std::size_t>(place)], period);
    }
  }
  std::vector<Bucket> out;
  out.reserve(plan.count);
  Instant begin = plan.begin;
  for (const Joined& bucket : joined) {
    out.push_back({.begin = begin,
                   .end = begin + plan.width,
                   .mean = bucket.sums.mean(),
                   .min_SI = bucket.sums.min,
                   .max_SI = bucket.sums.max,
                   .count = bucket.sums.count,
                   .covered = Span{std::llround(bucket.covered_ms)}});
    begin += plan.width;
  }
  return out;
}

}  // namespace lostwork
