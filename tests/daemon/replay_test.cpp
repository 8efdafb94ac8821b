#include "daemon/replay.h"

#include "daemon/csv.h"
#include "storage/history.h"
#include "tests/daemon/temporary_folder.h"

#include <array>
#include <cmath>
#include <fstream>
#include <map>
#include <optional>
#include <sstream>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using ::testing::HasSubstr;
using ::testing::IsEmpty;
using ::testing::Not;

struct Outcome {
  int code;
  std::string out;
  std::string err;
};

Outcome replayed(const std::vector<std::string>& arguments) {
  const std::vector<std::string_view> views(arguments.begin(), arguments.end());
  std::ostringstream out;
  std::ostringstream err;
  const int code = replay_command(views, out, err);
  return {.code = code, .out = out.str(), .err = err.str()};
}

using Row = std::map<std::string, std::string>;

std::vector<Row> rows_of(std::istream& in) {
  CsvReader reader{in};
  std::vector<std::string> header;
  std::vector<Row> rows;
  while (reader.next()) {
    if (reader.fields()[0].starts_with('#')) {
      continue;
    }
    if (header.empty()) {
      header.assign(reader.fields().begin(), reader.fields().end());
      continue;
    }
    Row& row = rows.emplace_back();
    for (std::size_t i = 0; i < header.size(); ++i) {
      row[header[i]] = std::string{reader.fields()[i]};
    }
  }
  return rows;
}

double number_in(const Row& row, const std::string& column) {
  return std::stod(row.at(column));
}

// A machine as in ASHRAE RP-1043: R134a, both water flows, pressures, and the source's own water,
// 500 Btu/(h gpm degF) = 4.1807e6 J/(m3 K).
constexpr std::string_view rp1043_plant = R"([site]
name = "laboratory"
[[machine]]
id = "chiller"
name = "Chiller"
duty = "cooling"
refrigerant = "R134a"
evaporator = "flooded"
rated_power_kW = 90
cold_stream = { rho_cp_J_m3K = 4.1807e6 }
hot_stream = { rho_cp_J_m3K = 4.1807e6 }
)";

struct Column {
  const char* point;
  const char* source;  // in the published table
  const char* role;
  const char* unit;
};
constexpr std::array rp1043_columns{
    Column{  "chw_in",       "chw_in_C",  "cold.in.temperature",    "degC"},
    Column{ "chw_out",      "chw_out_C", "cold.out.temperature",    "degC"},
    Column{   "cw_in",        "cw_in_C",   "hot.in.temperature",    "degC"},
    Column{  "cw_out",       "cw_out_C",  "hot.out.temperature",    "degC"},
    Column{"chw_flow",   "chw_flow_L_s",            "cold.flow",     "l_s"},
    Column{ "cw_flow",    "cw_flow_L_s",             "hot.flow",     "l_s"},
    Column{   "power",       "power_kW",                "power",      "kW"},
    Column{  "p_evap", "p_evap_kPa_abs",     "suction.pressure", "kPa_abs"},
    Column{  "p_cond", "p_cond_kPa_abs",   "discharge.pressure", "kPa_abs"},
};

std::string rp1043_file(std::string_view streams) {
  std::string text{rp1043_plant};
  if (!streams.empty()) {
    const auto from = text.find("cold_stream");
    text.erase(from);
    text += streams;
  }
  for (const Column& c : rp1043_columns) {
    text += std::string{"[[point]]\nid = \""} + c.point + "\"\nmachine = \"chiller\"\nrole = \"" +
            c.role + "\"\nunit = \"" + c.unit + "\"\naccuracy = { percent_of_reading = 0.1 }\n";
  }
  return text;
}

std::vector<Row> rp1043_table() {
  std::ifstream in{std::string{LOSTWORK_REFERENCE} + "/rp1043_normal_27_steady_states.csv"};
  return rows_of(in);
}

std::string rp1043_history() {
  std::string text = "time";
  for (const Column& c : rp1043_columns) {
    text += std::string{","} + c.point;
  }
  int hour = 0;
  for (const Row& row : rp1043_table()) {
    text += "\n2026-01-" + std::to_string(10 + hour / 24) + 'T' + (hour % 24 < 10 ? "0" : "") +
            std::to_string(hour % 24) + ":00:00Z";
    for (const Column& c : rp1043_columns) {
      text += ',' + row.at(c.source);
    }
    ++hour;
  }
  return text + '\n';
}

// Source: Comstock & Braun, ASHRAE RP-1043 (1999), 27 fault-free steady states; figures and honest
// tolerances in tests/reference/README.md.
class ReplayOfRp1043 : public ::testing::Test {
 protected:
  static std::vector<Row> results(std::string_view streams) {
    const TestFolder folder;
    const Outcome outcome = replayed({"--config", folder.file("plant.toml", rp1043_file(streams)),
                                      "--input", folder.file("history.csv", rp1043_history())});
    EXPECT_EQ(outcome.code, 0) << outcome.err;
    std::istringstream in{outcome.out};
    return rows_of(in);
  }
};

TEST_F(ReplayOfRp1043, GivesThePublishedLoadCopAndEfficiency) {
  const std::vector<Row> published = rp1043_table();
  const std::vector<Row> found = results("");
  ASSERT_EQ(published.size(), 27U);
  ASSERT_EQ(found.size(), published.size());
  for (std::size_t i = 0; i < found.size(); ++i) {
    const double load_kW = number_in(published[i], "Qe_reported_kW");
    EXPECT_NEAR(number_in(found[i], "cold_heat_kW"), load_kW, 0.003 * load_kW) << "state " << i + 1;
    const double cop = number_in(published[i], "COP_reported");
    EXPECT_NEAR(number_in(found[i], "cop"), cop, 0.004 * cop) << "state " << i + 1;
    const double efficiency = number_in(published[i], "eta_II_streams");
    EXPECT_NEAR(number_in(found[i], "second_law_efficiency"), efficiency, 0.01 * efficiency)
        << "state " << i + 1;
  }
}

TEST_F(ReplayOfRp1043, GivesThePublishedSaturationTemperatures) {
  const std::vector<Row> published = rp1043_table();
  const std::vector<Row> found = results("");
  for (std::size_t i = 0; i < found.size(); ++i) {
    EXPECT_NEAR(number_in(found[i], "evaporating_degC"), number_in(published[i], "t_evap_sat_C"),
                0.12)
        << "state " << i + 1;
    EXPECT_NEAR(number_in(found[i], "condensing_degC"), number_in(published[i], "t_cond_sat_C"),
                0.25)
        << "state " << i + 1;
  }
}

// The source's water has 0.4 % less heat capacity than water by IAPWS-95 at these temperatures.
TEST_F(ReplayOfRp1043, RealWaterAgreesWithinSevenTenthsOfAPercent) {
  const std::vector<Row> published = rp1043_table();
  const std::vector<Row> found = results("\n");
  for (std::size_t i = 0; i < found.size(); ++i) {
    const double load_kW = number_in(published[i], "Qe_reported_kW");
    EXPECT_NEAR(number_in(found[i], "cold_heat_kW"), load_kW, 0.007 * load_kW) << "state " << i + 1;
  }
}

constexpr std::string_view small_plant = R"([site]
name = "Tern Quay Dairy"
[[machine]]
id = "m"
name = "M"
refrigerant = "R134a"
rated_power_kW = 50
[[point]]
id = "t_in"
machine = "m"
role = "cold.in.temperature"
unit = "degC"
accuracy = { limit = 0.1 }
[[point]]
id = "t_out"
machine = "m"
role = "cold.out.temperature"
unit = "degC"
accuracy = { limit = 0.1 }
[[point]]
id = "flow"
machine = "m"
role = "cold.flow"
unit = "l_s"
value = 10
accuracy = { percent_of_reading = 2 }
)";

TEST(Replay, UsesAConstantPointWithoutAColumn) {
  const TestFolder folder;
  const Outcome outcome =
      replayed({"--config", folder.file("plant.toml", small_plant), "--input",
                folder.file("h.csv", "time,t_in,t_out\n2026-01-01T00:00:00Z,12,7\n")});
  ASSERT_EQ(outcome.code, 0) << outcome.err;
  std::istringstream in{outcome.out};
  EXPECT_THAT(rows_of(in).at(0).at("cold_in_degC"), HasSubstr("12"));
}

TEST(Replay, AnEmptyFieldIsAMissingQuantityWithItsReason) {
  const TestFolder folder;
  const Outcome outcome =
      replayed({"--config", folder.file("plant.toml", small_plant), "--input",
                folder.file("h.csv", "time,t_in,t_out\n2026-01-01T00:00:00Z,,7\n")});
  ASSERT_EQ(outcome.code, 0) << outcome.err;
  std::istringstream in{outcome.out};
  const Row row = rows_of(in).at(0);
  EXPECT_THAT(row.at("cold_in_degC"), IsEmpty());
  EXPECT_THAT(row.at("reasons"), HasSubstr("cold_in_degC:"));
}

// small_plant has the default period of ten seconds.
TEST(Replay, SaysThatTheRowsAreNotAsFarApartAsTheScans) {
  const TestFolder folder;
  const Outcome outcome = replayed(
      {"--config", folder.file("plant.toml", small_plant), "--input",
       folder.file("h.csv",
                   "time,t_in,t_out\n2026-01-01T00:00:00Z,12,7\n2026-01-01T00:01:00Z,12,7\n")});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.err, HasSubstr("the rows are 60 s apart, but m has scan_s = 10"));
}

TEST(Replay, SaysThatRowsFarApartTeachNothing) {
  const TestFolder folder;
  const Outcome outcome = replayed(
      {"--config", folder.file("plant.toml", small_plant), "--input",
       folder.file("h.csv",
                   "time,t_in,t_out\n2026-01-01T00:00:00Z,12,7\n2026-01-01T00:15:00Z,12,7\n")});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.err, HasSubstr("rows more than 75 s apart"));
}

// Closer rows lose nothing.
TEST(Replay, SaysNothingOfRowsCloserThanTheScans) {
  const TestFolder folder;
  const Outcome outcome = replayed(
      {"--config", folder.file("plant.toml", small_plant), "--input",
       folder.file("h.csv",
                   "time,t_in,t_out\n2026-01-01T00:00:00Z,12,7\n2026-01-01T00:00:01Z,12,7\n")});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.err, Not(HasSubstr("apart")));
}

struct BadHistory {
  const char* name;
  const char* text;
  const char* message;
};

class ReplayRefuses : public ::testing::TestWithParam<BadHistory> {};

TEST_P(ReplayRefuses, ABadHistoryAndWritesNothing) {
  const TestFolder folder;
  const std::string output = (folder / "out.csv").string();
  const std::string database = (folder / "out.db").string();
  const Outcome outcome =
      replayed({"--config", folder.file("plant.toml", small_plant), "--input",
                folder.file("h.csv", GetParam().text), "--output", output, "--database", database});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr(GetParam().message));
  EXPECT_FALSE(std::filesystem::exists(output));
  EXPECT_FALSE(std::filesystem::exists(database));
}

INSTANTIATE_TEST_SUITE_P(
    Histories, ReplayRefuses,
    ::testing::Values(
        BadHistory{"NoTime", "t_in,t_out\n", ":1: the first column of the header must be time"},
        BadHistory{"AnUnknownColumn", "time,t_in,t_out,x\n",
                   ":1: column x: the plant file has no such point"},
        BadHistory{"AMissingColumn", "time,t_in\n", ":1: column t_out is missing"},
        BadHistory{"AColumnForAConstant", "time,t_in,t_out,flow\n",
                   "column flow: the plant file gives this point"},
        BadHistory{"ADoubleColumn", "time,t_in,t_in,t_out\n", "t_in stands twice"},
        BadHistory{"AShortRow", "time,t_in,t_out\n2026-01-01T00:00:00Z,1\n",
                   ":2: 2 fields; allowed are 3"},
        BadHistory{"NoNumber", "time,t_in,t_out\n2026-01-01T00:00:00Z,12,seven\n",
                   ":2: column t_out: \"seven\" is no number"},
        BadHistory{"NoSuchTime", "time,t_in,t_out\n2026-13-01T00:00:00Z,12,7\n",
                   ":2: column time: \"2026-13-01"},
        BadHistory{"TimeGoingBack",
                   "time,t_in,t_out\n2026-01-02T00:00:00Z,12,7\n2026-01-01T00:00:00Z,12,7\n",
                   ":3: column time: \"2026-01-01T00:00:00Z\" is not later than the row before"}),
    [](const auto& param) { return std::string{param.param.name}; });

TEST(Replay, NamesEveryMistakeOfThePlantFile) {
  const TestFolder folder;
  const Outcome outcome = replayed(
      {"--config", folder.file("plant.toml", "[sight]\n[web]\nlisten = 3\n"), "--input", "x"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("sight"));
  EXPECT_THAT(outcome.err, HasSubstr("web.listen"));
}

}  // namespace
}  // namespace lostwork
