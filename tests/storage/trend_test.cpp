#include "storage/trend.h"

#include "storage/key.h"
#include "tests/storage/plant.h"

#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

struct Question {
  std::string name;
  Instant from;
  Instant to;
  std::size_t max_points;
  Span width;
  Span source;
};

class Plan : public testing::TestWithParam<Question> {};

TEST_P(Plan, TakesTheNarrowestBucketsThatFit) {
  const Question& q = GetParam();
  const BucketPlan plan = plan_of(q.from, q.to, q.max_points);
  EXPECT_EQ(plan.width, q.width);
  EXPECT_EQ(plan.source, q.source);
}

TEST_P(Plan, CoversTheSpanWithNoMoreBucketsThanAskedFor) {
  const Question& q = GetParam();
  const BucketPlan plan = plan_of(q.from, q.to, q.max_points);
  EXPECT_LE(plan.count, q.max_points);
  EXPECT_LE(plan.begin, q.from);
  EXPECT_GT(plan.begin + plan.width, q.from);
  EXPECT_GE(plan.begin + static_cast<std::int64_t>(plan.count) * plan.width, q.to);
}

Question asked(std::string name, Instant from, Span span, std::size_t max_points, Span width,
               Span source) {
  return {.name = std::move(name),
          .from = from,
          .to = from + span,
          .max_points = max_points,
          .width = width,
          .source = source};
}

INSTANTIATE_TEST_SUITE_P(
    Spans, Plan,
    testing::Values(asked("DayByMinute", midnight, day, 1440, minute, minute),
                    asked("DayInAThousand", midnight, day, 1000, 2 * minute, minute),
                    asked("DayByHalfHour", midnight, day, 48, 30 * minute, minute),
                    asked("MonthByHour", midnight, 30 * day, 720, hour, hour),
                    asked("YearByDay", midnight, 365 * day, 400, day, day),
                    asked("YearInAThousand", midnight, 365 * day, 1000, 12 * hour, hour),
                    asked("OneMillisecond", midnight + Span{59999}, Span{1}, 5, minute, minute),
                    asked("HalfAnHourShifted", midnight + 30 * minute, day, 24, 2 * hour, hour)),
    [](const testing::TestParamInfo<Question>& q) { return q.param.name; });

TEST(PlanOf, FitsEverythingInOneBucket) {
  EXPECT_EQ(plan_of(first_storable, last_storable, 1).count, 1U);
}

TEST(PlanOf, FitsAMidnightInOneBucketOfSomeDays) {
  const BucketPlan plan = plan_of(midnight - hour, midnight + hour, 1);
  EXPECT_EQ(plan.count, 1U);
  EXPECT_EQ(plan.source, day);
}

QuantityPeriod period_at(Instant begin, double value, std::uint32_t count) {
  QuantityPeriod out{.begin = begin, .scans = 10, .covered_ms = 100'000, .sums = {}};
  const double n = count;
  out.sums.sum = n * value;
  out.sums.u_sum = n * 0.5;
  out.sums.weight = n;
  out.sums.min = value;
  out.sums.max = value;
  out.sums.count = count;
  return out;
}

TEST(BucketsOf, AreThereWhereNothingWasStored) {
  const auto buckets = buckets_of(plan_of(midnight, midnight + 3 * minute, 3), {});
  ASSERT_EQ(buckets.size(), 3U);
  EXPECT_EQ(buckets[2].mean.error().code, ReasonCode::not_read);
  EXPECT_EQ(buckets[2].count, 0U);
}

TEST(BucketsOf, WeighPeriodsByTheirScans) {
  const std::vector<QuantityPeriod> periods{period_at(midnight, 1.0, 2),
                                            period_at(midnight + minute, 4.0, 4)};
  const auto buckets = buckets_of(plan_of(midnight, midnight + 2 * minute, 1), periods);
  ASSERT_EQ(buckets.size(), 1U);
  EXPECT_EQ(buckets[0].mean, (Measured{.value = 3.0, .u = 0.5}));
  EXPECT_EQ(buckets[0].min_SI, 1.0);
  EXPECT_EQ(buckets[0].max_SI, 4.0);
  EXPECT_EQ(buckets[0].count, 6U);
}

TEST(BucketsOf, CoverOnlyTheScansThatHaveAValue) {
  // 2 and 4 of 10 scans that stand for 100 s.
  const std::vector<QuantityPeriod> periods{period_at(midnight, 1.0, 2),
                                            period_at(midnight + minute, 4.0, 4)};
  const auto buckets = buckets_of(plan_of(midnight, midnight + 2 * minute, 1), periods);
  EXPECT_EQ(buckets[0].covered, Span{60'000});
}

TEST(BucketsOf, TellTheLastReasonWhereAllIsMissing) {
  QuantityPeriod first{.begin = midnight, .scans = 1, .covered_ms = 1, .sums = {}};
  first.sums.reason.code = ReasonCode::machine_off;
  QuantityPeriod second{.begin = midnight + minute, .scans = 1, .covered_ms = 1, .sums = {}};
  second.sums.reason.code = ReasonCode::zero_flow;
  const std::vector<QuantityPeriod> periods{second, first};
  const auto buckets = buckets_of(plan_of(midnight, midnight + 2 * minute, 1), periods);
  EXPECT_EQ(buckets[0].mean.error().code, ReasonCode::zero_flow);
}

}  // namespace
}  // namespace lostwork
