// `lostwork run` as a process, against the simulated plant's Modbus server in this one.
#include "sensors/demo_plant/server.h"
#include "storage/history.h"
#include "tests/daemon/child_program.h"
#include "tests/daemon/temporary_folder.h"

#include <csignal>
#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using ::testing::HasSubstr;

constexpr Instant all_time{std::chrono::sys_days{std::chrono::January / 1 / 2400}};

// The example of the demonstration, scanned each second, with its bus at the given port.
std::string plant_text(std::uint16_t port, std::string_view more = "") {
  std::string text =
      text_of(std::string{LOSTWORK_SOURCE} + "/config/examples/tern_quay_dairy.toml");
  const auto replace_all = [&text](const std::string& what, const std::string& with) {
    for (auto at = text.find(what); at != std::string::npos;
         at = text.find(what, at + with.size())) {
      text.replace(at, what.size(), with);
    }
  };
  replace_all("127.0.0.1:1502\"", "127.0.0.1:" + std::to_string(port) + "\"\npause_ms = 0");
  replace_all("127.0.0.1:8470", "127.0.0.1:0");
  replace_all("scan_s = 60", "scan_s = 1");
  replace_all("scan_s = 10", "scan_s = 1");
  return text + std::string{more};
}

class Run : public ::testing::Test {
 protected:
  Run() : server_{0, register_image(Plant{PlantOptions{}})} {
    plant_file_ = folder_.file("plant.toml", plant_text(server_.port()));
  }

  [[nodiscard]] std::size_t stored_scans() const {
    const History history{(folder_ / "tern_quay_dairy.db").string()};
    return history.assessments("chiller-1", Instant{}, all_time).size();
  }

  TestFolder folder_;
  DemoServer server_;
  std::string plant_file_;
};

TEST_F(Run, EndsCleanlyAtSigtermWithEverythingOnDisk) {
  ChildProgram program{
      {"run", "--config", plant_file_}
  };
  static_cast<void>(program.wait_for_line("the page is at"));
  ChildProgram timed{
      {"run", "--config", "no-such-file"}
  };
  EXPECT_EQ(timed.wait(), 2);
  program.signal(SIGTERM);
  EXPECT_EQ(program.wait(), 0);
  EXPECT_NO_THROW(static_cast<void>(stored_scans()));
}

TEST_F(Run, StoresWhatItReadsFromRealModbusFrames) {
  ChildProgram program{
      {"run", "--config", plant_file_, "--seconds", "4"}
  };
  EXPECT_EQ(program.wait(), 0);
  EXPECT_GT(stored_scans(), 0U);
}

TEST_F(Run, GoesOnAfterSigkillWithTheHistoryWhole) {
  {
    ChildProgram first{
        {"run", "--config", plant_file_, "--seconds", "4"}
    };
    EXPECT_EQ(first.wait(), 0);
  }
  const std::size_t before = stored_scans();
  ChildProgram killed{
      {"run", "--config", plant_file_}
  };
  static_cast<void>(killed.wait_for_line("the page is at"));
  killed.signal(SIGKILL);
  EXPECT_EQ(killed.wait(), -SIGKILL);
  EXPECT_GE(stored_scans(), before);
  ChildProgram again{
      {"run", "--config", plant_file_, "--seconds", "2"}
  };
  EXPECT_EQ(again.wait(), 0);
}

TEST_F(Run, KeepsTheOldPlantFileWhenTheNewOneIsBad) {
  ChildProgram program{
      {"run", "--config", plant_file_}
  };
  static_cast<void>(program.wait_for_line("the page is at"));
  static_cast<void>(folder_.file("plant.toml", plant_text(server_.port(), "[nonsense]\nx = 1\n")));
  program.signal(SIGHUP);
  EXPECT_THAT(program.wait_for_line("nonsense"), HasSubstr("no such table"));
  static_cast<void>(program.wait_for_line("is kept"));
  program.signal(SIGTERM);
  EXPECT_EQ(program.wait(), 0);
}

TEST_F(Run, ReadsAGoodPlantFileAnew) {
  ChildProgram program{
      {"run", "--config", plant_file_}
  };
  static_cast<void>(program.wait_for_line("the page is at"));
  program.signal(SIGHUP);
  static_cast<void>(program.wait_for_line("read anew"));
  program.signal(SIGTERM);
  EXPECT_EQ(program.wait(), 0);
}

TEST_F(Run, ASecondOneOnTheSameDatabaseIsRefusedInOneSentence) {
  ChildProgram first{
      {"run", "--config", plant_file_}
  };
  static_cast<void>(first.wait_for_line("the page is at"));
  ChildProgram second{
      {"run", "--config", plant_file_}
  };
  EXPECT_THAT(second.wait_for_line("another lostwork"), HasSubstr("tern_quay_dairy.db"));
  EXPECT_EQ(second.wait(), 2);
}

TEST_F(Run, RefusesAnAddressThatIsNotLoopback) {
  std::string text = plant_text(server_.port());
  text.replace(text.find("127.0.0.1:0"), 11, "0.0.0.0:8470");
  ChildProgram program{
      {"run", "--config", folder_.file("open.toml", text)}
  };
  EXPECT_THAT(program.wait_for_line("0.0.0.0"), HasSubstr("an address of this computer itself"));
  EXPECT_EQ(program.wait(), 2);
}

}  // namespace
}  // namespace lostwork
