// What a database may not be, and what is said then.
#include "storage/database.h"
#include "storage/history.h"
#include "storage/key.h"
#include "storage/schema.h"
#include "storage/store.h"
#include "tests/storage/plant.h"

#include <array>
#include <fstream>
#include <signal.h>  // NOLINT(modernize-deprecated-headers): kill is POSIX, not ISO C
#include <string>
#include <string_view>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::StartsWith;

class Open : public testing::Test {
 protected:
  [[nodiscard]] std::string refusal_of_store() const {
    return sentence_of([this] { Store{{.file = folder_.file()}}; });
  }
  [[nodiscard]] std::string refusal_of_history() const {
    return sentence_of([this] { History{folder_.file()}; });
  }
  void make_store() const {
    Store store{
        {.file = folder_.file(), .durability = Durability::process}
    };
    ASSERT_TRUE(store.write(batch_of({plain_row(layout_of("chiller-1"), midnight, 1.0)})).stored);
  }
  void run(const std::string& sql) const { Database::writer(folder_.file()).run(sql); }

  Folder folder_;
};

TEST_F(Open, MakesAFileWithEveryTable) {
  make_store();
  EXPECT_EQ(Database::reader(folder_.file()).integer("PRAGMA user_version"),
            static_cast<std::int64_t>(schema_scripts().size()));
}

TEST_F(Open, MakesStrictTablesOnly) {
  make_store();
  EXPECT_EQ(Database::reader(folder_.file())
                .text("SELECT group_concat(name) FROM pragma_table_list "
                      "WHERE schema = 'main' AND NOT strict AND name NOT LIKE 'sqlite_%'"),
            "");
}

TEST_F(Open, RefusesALaterVersion) {
  make_store();
  run("PRAGMA user_version = 99");
  EXPECT_THAT(refusal_of_store(), StartsWith(folder_.file() + ": "));
  EXPECT_THAT(refusal_of_store(),
              HasSubstr("later version of lostwork (its tables are version 99"));
  EXPECT_THAT(refusal_of_history(), HasSubstr("later version of lostwork"));
}

TEST_F(Open, RefusesADatabaseOfAnotherProgram) {
  run("CREATE TABLE songs (title TEXT)");
  EXPECT_EQ(refusal_of_store(), folder_.file() + ": is a database of another program");
  EXPECT_EQ(refusal_of_history(), folder_.file() + ": is a database of another program");
}

TEST_F(Open, LeavesADatabaseOfAnotherProgramAsItWas) {
  run("CREATE TABLE songs (title TEXT)");
  EXPECT_FALSE(refusal_of_store().empty());
  EXPECT_EQ(Database::reader(folder_.file()).text("SELECT group_concat(name) FROM sqlite_schema"),
            "songs");
}

TEST_F(Open, RefusesWhatIsNotADatabase) {
  std::ofstream{folder_.file()} << std::string(5000, 'x');
  EXPECT_EQ(refusal_of_store(), folder_.file() + ": is not a database");
  EXPECT_EQ(refusal_of_history(), folder_.file() + ": is not a database");
}

TEST_F(Open, RefusesAFolder) {
  std::filesystem::create_directory(folder_.file());
  EXPECT_EQ(refusal_of_store(), folder_.file() + ": is a folder, not a database");
}

TEST_F(Open, RefusesAPathIntoAFolderThatIsNotThere) {
  const std::string file = folder_.file("no/plant.db");
  const std::string refusal = sentence_of([&file] { Store{{.file = file}}; });
  EXPECT_THAT(refusal, StartsWith(file + ": "));
  EXPECT_THAT(refusal, HasSubstr("No such file or directory"));
}

TEST_F(Open, OfAHistoryThatIsNotThereIsRefused) {
  EXPECT_EQ(refusal_of_history(), folder_.file() + ": there is no such file");
}

TEST_F(Open, RefusesASecondWriter) {
  const Store first{{.file = folder_.file()}};
  EXPECT_EQ(refusal_of_store(), folder_.file() + ": another lostwork writes it (process " +
                                    std::to_string(getpid()) + ")");
}

TEST_F(Open, RefusesASecondWriterUnderAnotherName) {
  const Store first{{.file = folder_.file()}};
  std::filesystem::create_symlink(folder_.file(), folder_.file("alias.db"));
  const std::string alias = folder_.file("alias.db");
  EXPECT_THAT(sentence_of([&alias] { Store{{.file = alias}}; }),
              HasSubstr("another lostwork writes it"));
}

TEST_F(Open, TakesAFileWhoseWriterWasKilled) {
  std::array<int, 2> ready{};
  ASSERT_EQ(pipe(ready.data()), 0);
  const pid_t child = fork();
  ASSERT_GE(child, 0);
  if (child == 0) {
    const Store store{{.file = folder_.file()}};
    if (::write(ready[1], "x", 1) == 1) {
      pause();
    }
    _exit(1);
  }
  char byte = 0;
  ASSERT_EQ(::read(ready[0], &byte, 1), 1);
  EXPECT_THAT(refusal_of_store(), HasSubstr("(process " + std::to_string(child) + ")"));
  kill(child, SIGKILL);
  waitpid(child, nullptr, 0);
  EXPECT_EQ(refusal_of_store(), "");
  close(ready[0]);
  close(ready[1]);
}

TEST_F(Open, RefusesAFileThatAnotherProgramHoldsLocked) {
  make_store();
  Database other = Database::writer(folder_.file());
  other.run("PRAGMA locking_mode = EXCLUSIVE; BEGIN EXCLUSIVE");
  EXPECT_EQ(refusal_of_store(), folder_.file() + ": is locked by another program");
}

// Permissions do not bind the superuser: takes on another user's rights for a while.
class AsNobody {
 public:
  explicit AsNobody(const Folder& folder) {
    std::filesystem::permissions(folder.path(), std::filesystem::perms{0755});
    if (geteuid() == 0 && seteuid(65534) == 0) {
      changed_ = true;
    }
  }
  AsNobody(const AsNobody&) = delete;
  AsNobody& operator=(const AsNobody&) = delete;
  ~AsNobody() {
    if (changed_ && seteuid(0) != 0) {
      std::abort();
    }
  }

 private:
  bool changed_ = false;
};

TEST_F(Open, RefusesAFolderThatMayNotBeWritten) {
  make_store();
  const AsNobody nobody{folder_};
  std::filesystem::path lock = folder_.file() + "-writer";
  if (geteuid() == 65534) {
    EXPECT_THAT(refusal_of_store(), HasSubstr("Permission denied"));
  } else {
    chmod(lock.c_str(), 0400);
    EXPECT_THAT(refusal_of_store(), HasSubstr("Permission denied"));
  }
}

TEST_F(Open, RefusesAFileThatMayNotBeWritten) {
  make_store();
  chmod(folder_.file().c_str(), 0444);
  std::filesystem::permissions(folder_.path(), std::filesystem::perms{0777});
  chmod((folder_.file() + "-writer").c_str(), 0666);
  if (geteuid() == 0) {
    ASSERT_EQ(seteuid(65534), 0);
  }
  const std::string refusal = refusal_of_store();
  if (getuid() == 0) {
    ASSERT_EQ(seteuid(0), 0);
  }
  EXPECT_EQ(refusal, folder_.file() + ": may not be written: no permission");
}

TEST_F(Open, ReadsAHistoryInAFolderThatMayNotBeWritten) {
  make_store();
  chmod(folder_.file().c_str(), 0444);
  std::filesystem::permissions(folder_.path(), std::filesystem::perms{0555});
  const bool root = geteuid() == 0;
  if (root) {
    ASSERT_EQ(seteuid(65534), 0);
  }
  std::size_t scans = 0;
  const std::string refusal = sentence_of([this, &scans] {
    scans = History{folder_.file()}
                .scans("chiller-1", {"chiller-1_point_0"}, first_storable, last_storable)
                .size();
  });
  if (root) {
    ASSERT_EQ(seteuid(0), 0);
  }
  EXPECT_EQ(refusal, "");
  EXPECT_EQ(scans, 1U);
}

TEST_F(Open, BringsAnOlderVersionUpToDateAndKeepsItsRows) {
  {
    Database old = Database::writer(folder_.file());
    migrate(old, schema_scripts().first(1));
    old.run("INSERT INTO plant_file (time_ms, hash, text) VALUES (1, 'h', 'kept')");
  }
  EXPECT_THAT(refusal_of_history(), HasSubstr("older version of lostwork"));
  Store store{{.file = folder_.file()}};
  Batch batch;
  batch.findings.emplace_back().id = "chiller-1.efficiency_drift.20240503";
  ASSERT_TRUE(store.write(std::move(batch)).stored);
  const History history{folder_.file()};
  EXPECT_EQ(history.current_findings().size(), 1U);
  EXPECT_EQ(history.plant_files().at(0).text, "kept");
}

TEST_F(Open, LeavesTheOldVersionWhereAScriptFails) {
  constexpr std::array<std::string_view, 2> scripts{"CREATE TABLE a (x INTEGER) STRICT",
                                                    "CREATE TABLE b (x INTEGER) STRICT; nonsense"};
  Database database = Database::writer(folder_.file());
  EXPECT_THAT(sentence_of([&] { migrate(database, scripts); }), HasSubstr("nonsense"));
  EXPECT_EQ(database.integer("PRAGMA user_version"), 1);
  EXPECT_EQ(database.text("SELECT group_concat(name) FROM sqlite_schema"), "a");
}

}  // namespace
}  // namespace lostwork
