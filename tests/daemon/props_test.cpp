#include "daemon/props.h"

#include "daemon/csv.h"

#include <algorithm>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <initializer_list>
#include <sstream>
#include <string>
#include <unistd.h>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::StartsWith;

struct Outcome {
  int code;
  std::string out;
  std::string err;

  // Cells of one line of the output; 0 is the header.
  [[nodiscard]] std::vector<std::string> cells(std::size_t line) const {
    std::istringstream in{out};
    CsvReader csv{in};
    for (std::size_t i = 0; i <= line; ++i) {
      if (!csv.next()) {
        return {};
      }
    }
    return {csv.fields().begin(), csv.fields().end()};
  }
};

Outcome props(std::initializer_list<std::string_view> arguments) {
  const std::vector<std::string_view> all{arguments};
  std::ostringstream out;
  std::ostringstream err;
  const int code = props_command(all, out, err);
  return {code, out.str(), err.str()};
}

// A file that is gone after the test.
class Points {
 public:
  explicit Points(std::string_view text)
      : path_{std::filesystem::temp_directory_path() /
              ("props_test_" + std::to_string(::getpid()) + ".csv")} {
    std::ofstream{path_} << text;
  }
  Points(const Points&) = delete;
  Points& operator=(const Points&) = delete;
  ~Points() { std::filesystem::remove(path_); }
  [[nodiscard]] std::string name() const { return path_.string(); }

 private:
  std::filesystem::path path_;
};

Outcome props_of(std::string_view pair, std::string_view text) {
  const Points points{text};
  return props({"--fluid", "R134a", "--given", pair, "--input", points.name()});
}

constexpr std::string_view header =
    "fluid,phase,T_degC,p_kPa,rho_kg_m3,h_kJ_kg,s_kJ_kgK,x,cp_kJ_kgK,w_m_s,reason";

double number(const std::string& cell) {
  return std::strtod(cell.c_str(), nullptr);
}

TEST(Props, WritesARowWithTheNamedColumns) {
  const Outcome outcome = props({"--fluid", "R134a", "--given", "T,x", "0", "0"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.out, StartsWith(std::string{header} + "\n"));
  EXPECT_EQ(outcome.cells(1).size(), 11U);
  EXPECT_EQ(outcome.err, "");
}

TEST(Props, AgreesWithTheIndependentTable) {
  // tests/reference/r134a_states.csv, saturated liquid at 273.15 K.
  const auto cells = props({"--fluid", "R134a", "--given", "T,x", "0", "0"}).cells(1);
  EXPECT_EQ(cells[0], "R134a");
  EXPECT_EQ(cells[1], "liquid");
  EXPECT_EQ(cells[2], "0");
  EXPECT_NEAR(number(cells[3]), 292.80318234, 1e-7);
  EXPECT_NEAR(number(cells[4]), 1294.7770207, 1e-6);
  EXPECT_NEAR(number(cells[5]), 200.0, 1e-7);
  EXPECT_NEAR(number(cells[6]), 1.0, 1e-9);
  EXPECT_EQ(cells[7], "0");
  EXPECT_NEAR(number(cells[8]), 1.34104134, 1e-7);
  EXPECT_NEAR(number(cells[9]), 621.647864, 1e-5);
  EXPECT_EQ(cells[10], "");
}

TEST(Props, HasTenSignificantDigits) {
  // tests/reference/r134a_states.csv, vapour at 325.6481 K: 46.902257406 kg/m3.
  const auto cells = props({"--fluid", "R134a", "--given", "T,p", "52.4981", "1030.14"}).cells(1);
  EXPECT_EQ(cells[4], "46.90225741");
}

TEST(Props, TakesNegativeValues) {
  const Outcome outcome = props({"--fluid", "R134a", "--given", "T,x", "-10", "1"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_EQ(outcome.cells(1)[2], "-10");
}

TEST(Props, LeavesHeatCapacityAndSoundEmptyBetweenThePhases) {
  const auto cells = props({"--fluid", "R134a", "--given", "p,x", "600", "0.5"}).cells(1);
  EXPECT_EQ(cells[1], "two_phase");
  EXPECT_EQ(cells[7], "0.5");
  EXPECT_EQ(cells[8], "");
  EXPECT_EQ(cells[9], "");
}

TEST(Props, LeavesTheQualityEmptyOffTheLine) {
  EXPECT_EQ(props({"--fluid", "R134a", "--given", "T,p", "60", "500"}).cells(1)[7], "");
}

TEST(Props, AnswersByEnthalpyAndByEntropy) {
  // tests/reference/r134a_states.csv, vapour at 325.6481 K and 1030.14 kPa.
  const auto by_h = props({"--fluid", "R134a", "--given", "p,h", "1030.14", "432.95985307"});
  const auto by_s = props({"--fluid", "R134a", "--given", "p,s", "1030.14", "1.7525567966"});
  EXPECT_NEAR(number(by_h.cells(1)[2]), 325.6481 - 273.15, 1e-6);
  EXPECT_NEAR(number(by_s.cells(1)[2]), 325.6481 - 273.15, 1e-6);
}

TEST(Props, AcceptsExact) {
  const Outcome plain = props({"--fluid", "water", "--given", "T,p", "20", "101.325"});
  const Outcome exact = props({"--exact", "--fluid", "water", "--given", "T,p", "20", "101.325"});
  EXPECT_EQ(exact.code, 0);
  EXPECT_EQ(exact.cells(1)[0], "R718");
  EXPECT_EQ(exact.out, plain.out);
}

TEST(Props, AnswersEveryPointOfAFileInItsOrder) {
  const Outcome outcome = props_of("T,p", "T_degC,p_kPa\n60,500\n-20,500\r\n\n160,9000\n");
  EXPECT_EQ(outcome.code, 0);
  EXPECT_EQ(outcome.cells(1)[1], "vapour");
  EXPECT_EQ(outcome.cells(2)[1], "liquid");
  EXPECT_EQ(outcome.cells(3)[1], "supercritical");
  EXPECT_TRUE(outcome.cells(4).empty());
}

TEST(Props, FindsTheColumnsByTheirNames) {
  const Outcome outcome = props_of("p,x", "note,x,p_kPa\n\"first, cold\",1,300\n");
  EXPECT_EQ(outcome.code, 0);
  EXPECT_EQ(outcome.cells(1)[3], "300");
}

TEST(Props, GivesAnEmptyRowWithTheReasonForAPointWithoutAnswer) {
  const Outcome outcome = props_of("T,p", "T_degC,p_kPa\n500,100\n20,100\n");
  EXPECT_EQ(outcome.code, 0);
  const auto cells = outcome.cells(1);
  ASSERT_EQ(cells.size(), 11U);
  for (std::size_t i = 0; i < 10; ++i) {
    EXPECT_EQ(cells[i], "");
  }
  EXPECT_THAT(cells[10], StartsWith("outside_fluid: temperature 500 degC"));
  EXPECT_EQ(outcome.cells(2)[1], "vapour");
}

TEST(Props, FailsWithASentenceForOnePointWithoutAnswer) {
  const Outcome outcome = props({"--fluid", "R134a", "--given", "T,p", "500", "100"});
  EXPECT_EQ(outcome.code, 1);
  EXPECT_THAT(outcome.cells(1)[10], StartsWith("outside_fluid: temperature 500 degC"));
  EXPECT_THAT(outcome.err, HasSubstr("outside_fluid: temperature 500 degC"));
  EXPECT_EQ(std::count(outcome.err.begin(), outcome.err.end(), '\n'), 1);
}

TEST(Props, NamesAnImplausibleFigure) {
  const auto cells = props({"--fluid", "R134a", "--given", "T,x", "20", "1.5"}).cells(1);
  EXPECT_THAT(cells[10], StartsWith("implausible: quality 1.5 (0 to 1)"));
}

TEST(Props, RefusesACellThatIsNoNumberByFileLineAndColumn) {
  const Outcome outcome = props_of("T,p", "T_degC,p_kPa\n20,100\n20,warm\n");
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_THAT(outcome.err,
              HasSubstr(".csv:3: column p_kPa = \"warm\": allowed is a finite number"));
}

TEST(Props, RefusesACellThatIsNotFinite) {
  EXPECT_EQ(props_of("T,p", "T_degC,p_kPa\n20,nan\n").code, 2);
  EXPECT_EQ(props_of("T,p", "T_degC,p_kPa\n20,inf\n").code, 2);
  EXPECT_EQ(props_of("T,p", "T_degC,p_kPa\n20,\n").code, 2);
  EXPECT_EQ(props_of("T,p", "T_degC,p_kPa\n20,1e999\n").code, 2);
}

TEST(Props, RefusesAHeaderWithoutTheColumn) {
  const Outcome outcome = props_of("T,p", "T_degC,p_bar\n20,1\n");
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr(".csv:1: column p_kPa: missing from the header"));
}

TEST(Props, RefusesAHeaderThatNamesAColumnTwice) {
  EXPECT_THAT(props_of("T,p", "T_degC,p_kPa,T_degC\n20,1,21\n").err,
              HasSubstr("column T_degC: named twice"));
}

TEST(Props, RefusesARowThatIsTooShort) {
  EXPECT_THAT(props_of("T,p", "T_degC,p_kPa\n20\n").err,
              HasSubstr(".csv:2: 1 columns; allowed are 2"));
}

TEST(Props, RefusesAnEmptyFile) {
  EXPECT_THAT(props_of("T,p", "").err, HasSubstr(".csv:1: empty"));
}

TEST(Props, RefusesAFileThatIsNotThere) {
  const Outcome outcome =
      props({"--fluid", "R134a", "--given", "T,p", "--input", "/nowhere/points.csv"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("/nowhere/points.csv: cannot be read"));
}

TEST(Props, RefusesAnUnknownFluid) {
  const Outcome outcome = props({"--fluid", "R999", "--given", "T,p", "20", "100"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("--fluid R999: no such fluid; known: R134a R1234yf "));
}

TEST(Props, RefusesAnUnknownPair) {
  const Outcome outcome = props({"--fluid", "R134a", "--given", "h,s", "20", "100"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("--given h,s: allowed is"));
}

TEST(Props, RefusesOneValueAlone) {
  EXPECT_EQ(props({"--fluid", "R134a", "--given", "T,p", "20"}).code, 2);
}

TEST(Props, RefusesValuesBesideAFile) {
  EXPECT_EQ(props({"--fluid", "R134a", "--given", "T,p", "--input", "p.csv", "20", "1"}).code, 2);
}

TEST(Props, RefusesAValueThatIsNoNumber) {
  const Outcome outcome = props({"--fluid", "R134a", "--given", "T,p", "20", "1bar"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("p_kPa = \"1bar\": allowed is a finite number"));
}

TEST(Props, RefusesAQuestionWithoutAFluid) {
  EXPECT_THAT(props({"--given", "T,p", "20", "100"}).err, HasSubstr("--fluid: is required"));
}

TEST(Props, PrintsASaturationTable) {
  const Outcome outcome = props({"--fluid", "propane", "--saturation", "-50", "10", "30"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_EQ(outcome.cells(2)[1], "-20");
  EXPECT_EQ(outcome.cells(3)[1], "10");
  EXPECT_TRUE(outcome.cells(4).empty());
  // Lemmon, McLinden, Wagner 2009, table A1, 223.15 K, to the digits printed.
  const auto cells = outcome.cells(1);
  EXPECT_EQ(cells[1], "-50");
  EXPECT_NEAR(number(cells[2]), 70.569, 5e-4);
  EXPECT_EQ(cells[2], cells[3]);
  EXPECT_NEAR(number(cells[4]), 589.90, 5e-3);
  EXPECT_NEAR(number(cells[5]), 1.7270, 5e-5);
  EXPECT_NEAR(number(cells[6]), 82.753, 5e-4);
  EXPECT_NEAR(number(cells[7]), 516.48, 5e-3);
}

TEST(Props, PrintsBothLinesOfABlend) {
  const auto cells = props({"--fluid", "R407C", "--saturation", "0", "0", "1"}).cells(1);
  EXPECT_GT(number(cells[2]), 1.2 * number(cells[3]));
  EXPECT_NEAR(number(cells[6]), 200.0, 1e-4);
}

TEST(Props, SaysWhyARowOfTheTableIsEmpty) {
  const Outcome outcome = props({"--fluid", "R744", "--saturation", "20", "40", "20"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.cells(2)[11], StartsWith("outside_fluid: temperature 40 degC"));
}

TEST(Props, RefusesASaturationTableWithoutAnEnd) {
  for (const std::string_view step : {"0", "-1", "1e-9", "nan", "x"}) {
    const Outcome outcome = props({"--fluid", "R134a", "--saturation", "0", "20", step});
    EXPECT_EQ(outcome.code, 2) << step;
    EXPECT_THAT(outcome.err, HasSubstr("STEP")) << step;
  }
  EXPECT_EQ(props({"--fluid", "R134a", "--saturation", "20", "0", "1"}).code, 2);
  EXPECT_EQ(props({"--fluid", "R134a", "--saturation", "0", "20"}).code, 2);
  EXPECT_THAT(props({"--fluid", "R134a", "--given", "T,x", "--saturation", "0", "20", "5"}).err,
              HasSubstr("--given: not expected beside --saturation"));
}

TEST(Props, ListsEveryFluidWithItsSource) {
  const Outcome outcome = props({"--list"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.out, HasSubstr("R134a,,"));
  EXPECT_THAT(outcome.out, HasSubstr("doi:10.1063/1.555958"));
  EXPECT_THAT(outcome.out, HasSubstr("R718,water,"));
  EXPECT_THAT(outcome.out, HasSubstr("doi:10.1063/1.1461829"));
}

TEST(Props, ShowsItsHelp) {
  const Outcome outcome = props({"--help"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.out, HasSubstr("usage: lostwork props --fluid NAME"));
}

}  // namespace
}  // namespace lostwork
