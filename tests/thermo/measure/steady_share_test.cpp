#include "thermo/measure/steady_share.h"

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::days;
using std::chrono::hours;

const Instant noon{days{20000} + hours{12}};
constexpr SteadyVerdict steady{.cause = UnsteadyCause::none};
constexpr SteadyVerdict hunting{.cause = UnsteadyCause::scatter, .point = 1};
constexpr SteadyVerdict early{.cause = UnsteadyCause::hold_off};

MachineModel machine() {
  MachineModel model;
  model.points.emplace_back().role = Role::power;
  model.points.emplace_back().role = Role::cold_out_temperature;
  return model;
}

TEST(SteadyShare, IsNoneBeforeTheMachineRan) {
  EXPECT_FALSE(steady_share({}).share());
  EXPECT_EQ(text(steady_share({}), machine()), "");
}

TEST(SteadyShare, IsSteadyTimeOverRunningTime) {
  std::vector<SteadyDay> kept;
  count_running(kept, 2, noon, hours{1}, steady);
  count_running(kept, 2, noon, hours{2}, hunting);
  count_running(kept, 2, noon, hours{1}, early);
  EXPECT_EQ(steady_share(kept).share(), 0.25);
}

TEST(SteadyShare, NamesWhatMostWasLostTo) {
  std::vector<SteadyDay> kept;
  count_running(kept, 2, noon, hours{1}, steady);
  count_running(kept, 2, noon, hours{2}, hunting);
  count_running(kept, 2, noon, hours{1}, early);
  EXPECT_EQ(text(steady_share(kept), machine()),
            "Steady for 25 % of its running time of the last week. Most of the rest was lost to a "
            "signal that hunts (cold.out.temperature).");
}

TEST(SteadyShare, NamesNoSignalWhereItIsNone) {
  std::vector<SteadyDay> kept;
  count_running(kept, 2, noon, hours{1}, hunting);
  count_running(kept, 2, noon, hours{2}, early);
  EXPECT_EQ(steady_share(kept).main_cause, UnsteadyCause::hold_off);
  EXPECT_FALSE(steady_share(kept).point);
}

TEST(SteadyShare, ForgetsWhatIsOlderThanSevenDaysOnRecord) {
  std::vector<SteadyDay> kept;
  count_running(kept, 2, noon, hours{20}, hunting);
  for (int day = 1; day <= 7; ++day) {
    count_running(kept, 2, noon + days{day}, hours{1}, steady);
  }
  EXPECT_EQ(kept.size(), 7U);
  EXPECT_EQ(steady_share(kept).share(), 1.0);
}

}  // namespace
}  // namespace lostwork
