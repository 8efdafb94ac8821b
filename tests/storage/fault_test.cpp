// A full disk, a kill in the middle, damaged rows, readers beside the writer.
#include "storage/database.h"
#include "storage/history.h"
#include "storage/key.h"
#include "storage/store.h"
#include "tests/storage/plant.h"

#include <algorithm>
#include <array>
#include <atomic>
#include <csignal>
#include <cstdint>
#include <filesystem>
#include <random>
#include <string>
#include <sys/resource.h>
#include <sys/wait.h>
#include <thread>
#include <unistd.h>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;

const auto chiller = layout_of("chiller-1");

// The write-ahead log may not grow beyond what it has now: like a full disk.
class FullDisk {
 public:
  explicit FullDisk(const Folder& folder) {
    std::signal(SIGXFSZ, SIG_IGN);
    getrlimit(RLIMIT_FSIZE, &before_);
    rlimit limit = before_;
    limit.rlim_cur = std::filesystem::file_size(folder.file() + "-wal");
    setrlimit(RLIMIT_FSIZE, &limit);
  }
  FullDisk(const FullDisk&) = delete;
  FullDisk& operator=(const FullDisk&) = delete;
  ~FullDisk() { setrlimit(RLIMIT_FSIZE, &before_); }

 private:
  rlimit before_{};
};

class Fault : public testing::Test {
 protected:
  [[nodiscard]] StoreOptions options() const {
    return {.file = folder_.file(), .durability = Durability::process, .waiting_scans = 500};
  }
  [[nodiscard]] std::vector<ScanRow> rows_from(std::size_t minutes, std::size_t count) {
    return random_rows(random_, chiller, midnight + static_cast<std::int64_t>(minutes) * minute,
                       minute, count);
  }
  [[nodiscard]] std::size_t scans() const {
    return History{folder_.file()}
        .scans("chiller-1", chiller->points, first_storable, last_storable, 100000)
        .size();
  }
  [[nodiscard]] std::string integrity() const {
    return Database::reader(folder_.file()).text("PRAGMA integrity_check");
  }

  std::mt19937 random_{31};
  Folder folder_;
};

TEST_F(Fault, AFullDiskIsToldAndTheScansWait) {
  Store store{options()};
  ASSERT_TRUE(store.write(batch_of(rows_from(0, 10))).stored);
  const FullDisk full{folder_};
  const WriteResult result = store.write(batch_of(rows_from(10, 400)));
  EXPECT_FALSE(result.stored);
  EXPECT_EQ(result.waiting_scans, 400U);
  EXPECT_THAT(result.why, HasSubstr(folder_.file() + ": "));
  EXPECT_EQ(result.given_up, 0U);
}

TEST_F(Fault, AfterAFullDiskEverythingIsStoredOnce) {
  Store store{options()};
  ASSERT_TRUE(store.write(batch_of(rows_from(0, 10))).stored);
  {
    const FullDisk full{folder_};
    ASSERT_FALSE(store.write(batch_of(rows_from(10, 400))).stored);
    ASSERT_FALSE(store.write(batch_of(rows_from(410, 20))).stored);
  }
  EXPECT_TRUE(store.write({}).stored);
  EXPECT_EQ(scans(), 430U);
  EXPECT_EQ(integrity(), "ok");
  const auto buckets = History{folder_.file()}.trend({.machine = "chiller-1",
                                                      .quantity = Quantity::power,
                                                      .from = midnight,
                                                      .to = midnight + 430 * minute,
                                                      .max_points = 430});
  EXPECT_EQ(std::count_if(buckets.begin(), buckets.end(),
                          [](const Bucket& bucket) { return bucket.count > 1; }),
            0);
}

TEST_F(Fault, AFullDiskLeavesWhatWasThereReadable) {
  Store store{options()};
  ASSERT_TRUE(store.write(batch_of(rows_from(0, 10))).stored);
  const FullDisk full{folder_};
  ASSERT_FALSE(store.write(batch_of(rows_from(10, 400))).stored);
  EXPECT_EQ(scans(), 10U);
}

TEST_F(Fault, TheOldestScansAreGivenUpWhenMemoryIsFullAndTheGapIsRecorded) {
  Store store{options()};
  ASSERT_TRUE(store.write(batch_of(rows_from(0, 10))).stored);
  {
    const FullDisk full{folder_};
    const WriteResult result = store.write(batch_of(rows_from(10, 620)));
    ASSERT_FALSE(result.stored);
    EXPECT_EQ(result.waiting_scans, 500U);
    EXPECT_EQ(result.given_up, 120U);
  }
  ASSERT_TRUE(store.write({}).stored);
  EXPECT_EQ(scans(), 510U);
  const auto gaps = History{folder_.file()}.gaps(first_storable, last_storable);
  ASSERT_EQ(gaps.size(), 1U);
  EXPECT_EQ(gaps[0].machine, "chiller-1");
  EXPECT_EQ(gaps[0].begin, midnight + 10 * minute);
  EXPECT_EQ(gaps[0].end, midnight + 129 * minute);
  EXPECT_EQ(gaps[0].scans, 120U);
  EXPECT_FALSE(gaps[0].why.empty());
}

TEST_F(Fault, AlarmsWaitOutAFullDiskInTheirOrder) {
  Store store{options()};
  ASSERT_TRUE(store.write(batch_of(rows_from(0, 10))).stored);
  {
    const FullDisk full{folder_};
    for (int i = 0; i < 3; ++i) {
      Batch batch = batch_of(rows_from(10 + 150 * static_cast<std::size_t>(i), 150));
      batch.alarms.push_back(alarm_at(midnight + i * minute, "alarm-" + std::to_string(i)));
      ASSERT_FALSE(store.write(std::move(batch)).stored);
    }
  }
  ASSERT_TRUE(store.write({}).stored);
  const History history{folder_.file()};
  const auto journal = history.journal({});
  ASSERT_EQ(journal.size(), 3U);
  EXPECT_EQ(journal[0].row.alarm, "alarm-2");
  EXPECT_EQ(history.first_broken_journal_row(), std::nullopt);
}

// ---- kill

// Writes one scan after another, each with the state after it; says the number of each that was
// acknowledged.
[[noreturn]] void write_until_killed(const StoreOptions& options, std::int64_t from, int report) {
  Store store{options};
  for (std::int64_t i = from;; ++i) {
    const Instant time = midnight + i * Span{10000};
    Batch batch = batch_of({plain_row(chiller, time, static_cast<double>(i))});
    batch.states.push_back(state_of("chiller-1", time, static_cast<std::uint8_t>(i)));
    batch.alarms.push_back(alarm_at(time, "alarm-" + std::to_string(i)));
    if (!store.write(std::move(batch)).stored || ::write(report, &i, sizeof i) != sizeof i) {
      _exit(1);
    }
  }
}

class Kill : public Fault, public testing::WithParamInterface<unsigned> {
 protected:
  // Gives back the last number that was acknowledged, having killed after `acknowledged` of them.
  [[nodiscard]] std::int64_t killed_after(int acknowledged, std::int64_t from) const {
    std::array<int, 2> report{};
    EXPECT_EQ(pipe(report.data()), 0);
    const pid_t child = fork();
    if (child == 0) {
      write_until_killed(options(), from, report[1]);
    }
    close(report[1]);
    std::int64_t last = from - 1;
    for (int i = 0; i < acknowledged; ++i) {
      EXPECT_EQ(::read(report[0], &last, sizeof last), static_cast<ssize_t>(sizeof last));
    }
    kill(child, SIGKILL);
    waitpid(child, nullptr, 0);
    while (::read(report[0], &last, sizeof last) == static_cast<ssize_t>(sizeof last)) {
    }
    close(report[0]);
    return last;
  }
};

TEST_P(Kill, LosesNothingAcknowledgedAndDoublesNothing) {
  std::mt19937 random{GetParam()};
  std::int64_t from = 0;
  for (int round = 0; round < 3; ++round) {
    const int acknowledged = std::uniform_int_distribution<int>{1, 40}(random);
    const std::int64_t last = killed_after(acknowledged, from);
    ASSERT_EQ(integrity(), "ok");
    const History history{folder_.file()};
    const auto stored = history.scans("chiller-1", chiller->points, first_storable, last_storable);
    // One more may be there: stored, but killed before it could say so.
    ASSERT_GE(stored.size(), static_cast<std::size_t>(last + 1));
    ASSERT_LE(stored.size(), static_cast<std::size_t>(last + 2));
    for (std::size_t i = 0; i < stored.size(); ++i) {
      ASSERT_EQ(stored[i].readings[0].value_SI, static_cast<double>(i));
    }
    EXPECT_EQ(history.state("chiller-1")->time, stored.back().time);
    EXPECT_EQ(history.journal({.limit = 5000}).size(), stored.size());
    EXPECT_EQ(history.first_broken_journal_row(), std::nullopt);
    EXPECT_EQ(history
                  .trend({.machine = "chiller-1",
                          .quantity = Quantity::power,
                          .from = midnight,
                          .to = midnight + day,
                          .max_points = 1})
                  .at(0)
                  .count,
              stored.size());
    // The next one begins with what is there already: it must not be stored twice.
    from = last + 1;
  }
}

INSTANTIATE_TEST_SUITE_P(Seeds, Kill, testing::Range(1U, 9U));

// ---- damage

class Damage : public Fault {
 protected:
  Damage() {
    Store store{options()};
    rows_ = rows_from(0, 180);
    EXPECT_TRUE(store.write(batch_of(rows_)).stored);
    Batch batch;
    batch.states.push_back(state_of("chiller-1", midnight, 7));
    EXPECT_TRUE(store.write(std::move(batch)).stored);
  }
  // Inverts the lowest bit of one byte in the middle of the blob of the table's second row.
  void invert(const std::string& table, const std::string& column, int row = 1) {
    Database database = Database::writer(folder_.file());
    const std::string place = " WHERE rowid = (SELECT rowid FROM " + table + " LIMIT 1 OFFSET " +
                              std::to_string(row) + ")";
    Statement select{database, "SELECT " + column + " FROM " + table + place};
    std::vector<std::uint8_t> blob;
    {
      Rows rows{select};
      ASSERT_TRUE(rows.next());
      const auto read = rows.blob(0);
      blob.assign(read.begin(), read.end());
    }
    blob[blob.size() / 2] ^= 1U;
    Statement update{database, "UPDATE " + table + " SET " + column + " = ?1" + place};
    update.run(std::span<const std::uint8_t>{blob});
  }

  std::vector<ScanRow> rows_;
};

TEST_F(Damage, OfABlockOfScansLosesThatBlockOnly) {
  invert("sample_block", "scans");
  const History history{folder_.file()};
  EXPECT_EQ(history.scans("chiller-1", chiller->points, first_storable, last_storable).size(),
            120U);
  EXPECT_EQ(history.damaged_rows(), 1U);
}

TEST_F(Damage, OfABlockOfMinutesLosesThatBlockOnly) {
  invert("minute_block", "sums");
  const History history{folder_.file()};
  EXPECT_EQ(history.assessments("chiller-1", first_storable, last_storable).size(), 120U);
  EXPECT_EQ(history.damaged_rows(), 1U);
}

TEST_F(Damage, OfAnHourIsSeenInATrend) {
  invert("hour_sums", "sums");
  const History history{folder_.file()};
  const auto buckets = history.trend({.machine = "chiller-1",
                                      .quantity = Quantity::power,
                                      .from = midnight,
                                      .to = midnight + 3 * hour,
                                      .max_points = 3});
  EXPECT_EQ(buckets.at(1).count, 0U);
  EXPECT_GT(buckets.at(2).count, 0U);
  EXPECT_EQ(history.damaged_rows(), 1U);
}

TEST_F(Damage, OfAnHourAndADayIsMendedFromTheMinutesByTheNextScan) {
  invert("hour_sums", "sums");
  invert("day_sums", "sums", 0);
  Store{options()}.write(batch_of({plain_row(chiller, midnight + hour + Span{30'000}, 1.0)}));
  const History history{folder_.file()};
  const auto present = std::count_if(rows_.begin(), rows_.end(), [](const ScanRow& row) {
    return row.assessment.values[Quantity::power].has_value();
  });
  const auto days = history.trend({.machine = "chiller-1",
                                   .quantity = Quantity::power,
                                   .from = midnight,
                                   .to = midnight + day,
                                   .max_points = 1});
  const auto hours = history.trend({.machine = "chiller-1",
                                    .quantity = Quantity::power,
                                    .from = midnight,
                                    .to = midnight + 3 * hour,
                                    .max_points = 3});
  EXPECT_EQ(days.at(0).count, static_cast<std::uint64_t>(present) + 1);
  EXPECT_EQ(hours[0].count + hours[1].count + hours[2].count,
            static_cast<std::uint64_t>(present) + 1);
  EXPECT_EQ(history.damaged_rows(), 0U);
}

TEST_F(Damage, OfAStateIsTold) {
  invert("machine_state", "bytes", 0);
  const auto state = History{folder_.file()}.state("chiller-1");
  ASSERT_TRUE(state);
  EXPECT_TRUE(state->damaged);
  EXPECT_TRUE(state->bytes.empty());
}

// ---- readers

TEST_F(Fault, TwoReadersSeeWholeBatchesWhileTheWriterWrites) {
  constexpr std::size_t batches = 60;
  constexpr std::size_t scans_a_batch = 10;
  Store store{options()};
  ASSERT_TRUE(store.write(batch_of({})).stored);
  std::atomic<int> torn{0};
  const auto watch = [this, &torn] {
    const History history{folder_.file()};
    std::size_t seen = 0;
    while (seen < batches * scans_a_batch) {
      const std::size_t now =
          history.scans("chiller-1", chiller->points, first_storable, last_storable).size();
      if (now < seen || now % scans_a_batch != 0) {
        ++torn;
        return;
      }
      seen = now;
    }
  };
  std::thread first{watch};
  std::thread second{watch};
  for (std::size_t i = 0; i < batches; ++i) {
    EXPECT_TRUE(store.write(batch_of(rows_from(i * scans_a_batch, scans_a_batch))).stored);
  }
  first.join();
  second.join();
  EXPECT_EQ(torn, 0);
}

}  // namespace
}  // namespace lostwork
