#include "daemon/alarm_book.h"

#include "tests/daemon/book_fixture.h"

#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::IsEmpty;
using testing::SizeIs;

TEST_F(Book, IsSilentWhileAllIsWell) {
  EXPECT_THAT(scans(100), IsEmpty());
  EXPECT_THAT(current_alarms(book), IsEmpty());
}

TEST_F(Book, GoesThroughAllStates) {
  const std::string id = "chiller-1.point-lost.t_in";
  const Bad bad{
      {"t_in", Quality::timeout}
  };
  scans(3, bad);
  EXPECT_EQ(press(id), ActionResult::done);
  EXPECT_EQ(state(id), AlarmState::active_acknowledged);
  scans(7);
  EXPECT_EQ(state(id), AlarmState::normal);
  scans(3, bad);
  scans(7);
  EXPECT_EQ(state(id), AlarmState::returned_unacknowledged);
  scans(3, bad);
  EXPECT_EQ(state(id), AlarmState::active_unacknowledged);
  scans(7);
  EXPECT_EQ(press(id), ActionResult::done);
  EXPECT_EQ(state(id), AlarmState::normal);
  EXPECT_THAT(all, SizeIs(8));
  for (std::size_t i = 1; i < all.size(); ++i) {
    EXPECT_EQ(all[i].from, all[i - 1].to);
  }
}

TEST_F(Book, KeepsWhoSawAnAlarmAndTheComment) {
  const std::string id = "chiller-1.point-lost.t_in";
  scans(3, {
               {"t_in", Quality::timeout}
  });
  const ActionUpdate update = acknowledge(std::move(book), {.machine = "chiller-1",
                                                            .alarm = id,
                                                            .user = "Ann",
                                                            .comment = "sensor ordered",
                                                            .time = Instant{}});
  ASSERT_EQ(update.result, ActionResult::done);
  const std::vector<Alarm> shown = current_alarms(update.next);
  ASSERT_THAT(shown, SizeIs(1));
  ASSERT_TRUE(shown[0].acknowledged);
  EXPECT_EQ(shown[0].acknowledged->user, "Ann");
  EXPECT_EQ(shown[0].acknowledged->comment, "sensor ordered");
}

TEST_F(Book, MarksAnAlarmThatComesAndGoes) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  rules.timings.detector.off_delay = Span{0};
  for (int i = 0; i < 3; ++i) {
    values[3] = 600e-6;
    scan();
    values[3] = 0.0;
    scan();
  }
  ASSERT_THAT(current_alarms(book), SizeIs(1));
  EXPECT_TRUE(current_alarms(book)[0].chattering);
  EXPECT_THAT(current_alarms(book)[0].text, HasSubstr("three times within a minute"));
}

TEST_F(Book, RefusesAnAcknowledgementWithASentence) {
  EXPECT_EQ(press("chiller-1.nothing"), ActionResult::no_such_alarm);
  scans(3, {
               {"t_in", Quality::timeout}
  });
  EXPECT_EQ(press("chiller-1.point-lost.t_in", ""), ActionResult::no_user);
  EXPECT_EQ(press("chiller-1.point-lost.t_in"), ActionResult::done);
  EXPECT_EQ(press("chiller-1.point-lost.t_in"), ActionResult::already);
  EXPECT_THAT(text(ActionResult::no_such_alarm), HasSubstr("no such alarm"));
}

TEST_F(Book, JournalsWhoAcknowledgedAndWhatTheySaid) {
  scans(3, {
               {"t_in", Quality::timeout}
  });
  press("chiller-1.point-lost.t_in");
  EXPECT_EQ(all.back().user, "ann");
  EXPECT_EQ(all.back().comment, "seen");
  EXPECT_EQ(all.back().time, now);
}

TEST_F(Book, ACommentChangesNoState) {
  scans(3, {
               {"t_in", Quality::timeout}
  });
  const ActionUpdate update = comment(book, {.machine = model.id,
                                             .alarm = "chiller-1.point-lost.t_in",
                                             .user = "ann",
                                             .comment = "cable is being replaced",
                                             .time = now});
  ASSERT_THAT(update.events, SizeIs(1));
  EXPECT_EQ(update.events[0].from, update.events[0].to);
  EXPECT_EQ(update.result, ActionResult::done);
}

Finding drift(const std::string& id, FindingState state) {
  Finding f;
  f.id = id;
  f.machine = "chiller-1";
  f.kind = FindingKind::efficiency_drift;
  f.state = state;
  f.size = {.value = 0.06, .u = 0.01};
  return f;
}

TEST_F(Book, AWatchIsNotAnnounced) {
  EXPECT_THAT(scan({}, {drift("chiller-1.d.1", FindingState::watch)}), IsEmpty());
}

TEST_F(Book, AConfirmedDriftIsAnAlarmOfItsOwn) {
  const auto events = scan({}, {drift("chiller-1.d.1", FindingState::active)});
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].kind, AlarmKind::drift);
  EXPECT_EQ(events[0].alarm, "chiller-1.d.1");
  EXPECT_THAT(events[0].text, HasSubstr("Chiller 1 needs 6.0 %"));
}

TEST_F(Book, ADriftThatGrowsKeepsItsAlarmAndRenewsItsText) {
  scan({}, {drift("chiller-1.d.1", FindingState::active)});
  Finding grown = drift("chiller-1.d.1", FindingState::active);
  grown.size.value = 0.08;
  EXPECT_THAT(scan({}, {grown}), IsEmpty());
  ASSERT_THAT(current_alarms(book), SizeIs(1));
  EXPECT_THAT(current_alarms(book)[0].text, HasSubstr("needs 8.0 %"));
}

TEST_F(Book, ADriftThatIsOverIsForgottenOnceItWasSeen) {
  scan({}, {drift("chiller-1.d.1", FindingState::active)});
  scan({}, {drift("chiller-1.d.1", FindingState::over)});
  EXPECT_EQ(state("chiller-1.d.1"), AlarmState::returned_unacknowledged);
  press("chiller-1.d.1");
  scan();
  EXPECT_THAT(current_alarms(book), IsEmpty());
}

TEST_F(Book, PutsDangerFirst) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  values[3] = 600e-6;
  scan();
  scans(3, {
               {"t_in", Quality::timeout}
  });
  ASSERT_THAT(current_alarms(book), SizeIs(2));
  EXPECT_EQ(current_alarms(book)[0].priority, AlarmPriority::danger);
}

TEST_F(Book, AnAlarmWhoseRuleIsGoneReturns) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  values[3] = 600e-6;
  scan();
  rules.limits.clear();
  book = fitted(model, rules, std::move(book));
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].to, AlarmState::returned_unacknowledged);
  EXPECT_THAT(events[0].text, HasSubstr("rule is gone"));
}

TEST_F(Book, KeepsItsAlarmsThroughANewPlantFile) {
  scans(3, {
               {"t_in", Quality::timeout}
  });
  rules.limits = {limit_of(SafetyKind::oxygen, 0.195)};
  book = fitted(model, rules, std::move(book));
  EXPECT_EQ(state("chiller-1.point-lost.t_in"), AlarmState::active_unacknowledged);
}

}  // namespace
}  // namespace lostwork
