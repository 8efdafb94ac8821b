#include "storage/journal.h"

#include "storage/history.h"
#include "storage/store.h"
#include "tests/storage/plant.h"

#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

class Journal : public testing::Test {
 protected:
  void write(std::vector<AlarmRow> alarms) {
    Batch batch;
    batch.alarms = std::move(alarms);
    ASSERT_TRUE(store_.write(std::move(batch)).stored);
  }
  void write_five() {
    for (int i = 0; i < 5; ++i) {
      write({alarm_at(midnight + i * Span{1000}, "alarm-" + std::to_string(i))});
    }
  }
  [[nodiscard]] History history() const { return History{folder_.file()}; }
  // Past the triggers, as somebody with the file in hands could.
  void tamper(const std::string& sql) {
    Database database = Database::writer(folder_.file());
    database.run("DROP TRIGGER alarm_journal_keeps_rows; DROP TRIGGER alarm_journal_keeps_words");
    database.run(sql);
  }

  Folder folder_;
  Store store_{
      {.file = folder_.file(), .durability = Durability::process}
  };
};

TEST_F(Journal, GivesARowBackAsItWasWritten) {
  AlarmRow row = alarm_at(midnight, "a");
  row.text = "Tern's \"quay\"; DROP TABLE alarm_journal; -- \xC3\xA9";
  row.user = "m.keller";
  row.comment = std::string{"with\0zero", 9};
  row.from = 1;
  row.to = 2;
  row.priority = 1;
  row.utc_offset = std::chrono::minutes{-570};
  write({row});
  const auto journal = history().journal({});
  ASSERT_EQ(journal.size(), 1U);
  EXPECT_EQ(journal[0].number, 1);
  EXPECT_EQ(journal[0].row, row);
}

TEST_F(Journal, HoldsATransitionOnceHoweverOftenItIsGiven) {
  write_five();
  write_five();
  EXPECT_EQ(history().journal({}).size(), 5U);
}

TEST_F(Journal, KeepsTwoCommentsOnOneAlarm) {
  AlarmRow first = alarm_at(midnight, "a");
  first.comment = "seen";
  AlarmRow second = first;
  second.comment = "spare part ordered";
  write({first, second});
  EXPECT_EQ(history().journal({}).size(), 2U);
}

TEST_F(Journal, IsReadPageByPageNewestFirst) {
  write_five();
  const History history = this->history();
  const auto first = history.journal({.limit = 2});
  ASSERT_EQ(first.size(), 2U);
  EXPECT_EQ(first[0].row.alarm, "alarm-4");
  const auto second = history.journal({.before = first[1].number, .limit = 2});
  ASSERT_EQ(second.size(), 2U);
  EXPECT_EQ(second[0].row.alarm, "alarm-2");
  EXPECT_EQ(history.journal({.before = second[1].number}).size(), 1U);
}

TEST_F(Journal, IsReadForOneMachineOrForThePlant) {
  AlarmRow plant = alarm_at(midnight, "plant");
  plant.machine.clear();
  write({alarm_at(midnight, "a"), plant});
  const History history = this->history();
  EXPECT_EQ(history.journal({.machine = "chiller-1"}).at(0).row.alarm, "a");
  EXPECT_EQ(history.journal({.machine = ""}).at(0).row.alarm, "plant");
}

TEST_F(Journal, IsReadBetweenTwoTimes) {
  write_five();
  const auto rows = history().journal({.from = midnight + Span{1000}, .to = midnight + Span{3000}});
  ASSERT_EQ(rows.size(), 2U);
  EXPECT_EQ(rows[0].row.alarm, "alarm-2");
}

TEST_F(Journal, RefusesAChange) {
  write_five();
  Database database = Database::writer(folder_.file());
  EXPECT_THAT(sentence_of([&] { database.run("UPDATE alarm_journal SET text = 'x'"); }),
              testing::HasSubstr("append-only"));
}

TEST_F(Journal, RefusesARemoval) {
  write_five();
  Database database = Database::writer(folder_.file());
  EXPECT_THAT(sentence_of([&] { database.run("DELETE FROM alarm_journal"); }),
              testing::HasSubstr("append-only"));
}

TEST_F(Journal, IsUnbrokenAsWritten) {
  EXPECT_EQ(history().first_broken_journal_row(), std::nullopt);
  write_five();
  EXPECT_EQ(history().first_broken_journal_row(), std::nullopt);
}

TEST_F(Journal, TellsWhichRowWasAltered) {
  write_five();
  tamper("UPDATE alarm_journal SET text = 'x' WHERE number = 3");
  EXPECT_EQ(history().first_broken_journal_row(), 3);
}

TEST_F(Journal, TellsThatARowWasTakenOut) {
  write_five();
  tamper("DELETE FROM alarm_journal WHERE number = 2");
  EXPECT_EQ(history().first_broken_journal_row(), 2);
}

TEST_F(Journal, TellsThatTheLastRowsWereTakenOff) {
  write_five();
  tamper("DELETE FROM alarm_journal WHERE number > 3");
  EXPECT_EQ(history().first_broken_journal_row(), 4);
}

}  // namespace
}  // namespace lostwork
