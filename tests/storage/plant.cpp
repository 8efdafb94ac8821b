#include "tests/storage/plant.h"

#include <array>
#include <bit>
#include <cmath>
#include <stdlib.h>  // NOLINT(modernize-deprecated-headers): mkdtemp is POSIX, not ISO C
#include <string_view>
#include <utility>

#include <gtest/gtest.h>

namespace lostwork {

Folder::Folder() {
  std::string name = (std::filesystem::temp_directory_path() / "lostwork-storage-XXXXXX").string();
  if (mkdtemp(name.data()) == nullptr) {
    throw std::runtime_error{"no temporary folder"};
  }
  path_ = name;
}

Folder::~Folder() {
  std::error_code ignored;
  std::filesystem::permissions(path_, std::filesystem::perms::owner_all, ignored);
  std::filesystem::remove_all(path_, ignored);
}

std::shared_ptr<const MachineLayout> layout_of(const std::string& machine, std::size_t points) {
  MachineLayout out{.machine = machine, .points = {}};
  for (std::size_t i = 0; i < points; ++i) {
    out.points.push_back(machine + "_point_" + std::to_string(i));
  }
  return std::make_shared<const MachineLayout>(std::move(out));
}

ScanRow random_row(std::mt19937& random, const std::shared_ptr<const MachineLayout>& layout,
                   Instant time) {
  constexpr std::array<std::string_view, 3> blames{"", "suction.pressure", "baseline"};
  std::uniform_real_distribution<double> value{-10.0, 400.0};
  std::uniform_int_distribution<int> die{0, 5};
  ScanRow out;
  out.layout = layout;
  out.covers = Span{10000};
  out.scan.time = time;
  for (std::size_t i = 0; i < layout->points.size(); ++i) {
    out.scan.readings.push_back(
        {.value_SI = die(random) < 3 ? std::round(value(random)) : value(random),
         .u_SI = die(random) < 3 ? 0.1 : std::abs(value(random)),
         .quality = die(random) == 0 ? Quality::timeout : Quality::good,
         .time = die(random) == 0 ? Instant{} : time - Span{die(random)}});
  }
  out.assessment.time = time;
  out.assessment.mode = static_cast<Mode>(die(random));
  out.assessment.level = static_cast<Level>(die(random));
  out.assessment.steady = die(random) < 3;
  for (std::size_t i = 0; i < quantity_count; ++i) {
    auto& quantity = out.assessment.values[static_cast<Quantity>(i)];
    if (die(random) == 0) {
      Reason reason{.code = static_cast<ReasonCode>(die(random)),
                    .blame = blames.at(static_cast<std::size_t>(die(random)) % blames.size())};
      if (die(random) < 3) {
        reason.value_SI = value(random);
      }
      quantity = tl::unexpected{reason};
    } else {
      quantity = Measured{.value = value(random), .u = std::abs(value(random))};
    }
  }
  return out;
}

ScanRow plain_row(const std::shared_ptr<const MachineLayout>& layout, Instant time, double value) {
  ScanRow out;
  out.layout = layout;
  out.covers = Span{10000};
  out.scan.time = time;
  out.scan.readings.assign(
      layout->points.size(),
      {.value_SI = value, .u_SI = 0.5, .quality = Quality::good, .time = time});
  out.assessment.time = time;
  out.assessment.mode = Mode::running;
  out.assessment.level = Level::L4;
  out.assessment.steady = true;
  for (std::size_t i = 0; i < quantity_count; ++i) {
    out.assessment.values[static_cast<Quantity>(i)] = Measured{.value = value, .u = 0.5};
  }
  return out;
}

std::vector<ScanRow> random_rows(std::mt19937& random,
                                 const std::shared_ptr<const MachineLayout>& layout, Instant begin,
                                 Span step, std::size_t count) {
  std::vector<ScanRow> out;
  for (std::size_t i = 0; i < count; ++i) {
    out.push_back(random_row(random, layout, begin + static_cast<std::int64_t>(i) * step));
  }
  return out;
}

Batch batch_of(std::vector<ScanRow> rows) {
  Batch out;
  out.scans = std::move(rows);
  return out;
}

StateRow state_of(const std::string& machine, Instant time, std::uint8_t fill) {
  return {.machine = machine,
          .version = 3,
          .time = time,
          .bytes = std::vector<std::uint8_t>(1000, fill)};
}

AlarmRow alarm_at(Instant time, const std::string& alarm) {
  return {.time = time,
          .utc_offset = std::chrono::minutes{60},
          .machine = "chiller-1",
          .alarm = alarm,
          .kind = 2,
          .from = 0,
          .to = 1,
          .priority = 3,
          .text = "A point is lost.",
          .evidence_json = R"({"silent_s":61})",
          .user = {},
          .comment = {}};
}

void expect_same_bits(double a, double b) {
  EXPECT_EQ(std::bit_cast<std::uint64_t>(a), std::bit_cast<std::uint64_t>(b)) << a << " " << b;
}

void expect_same(const Reading& a, const Reading& b) {
  expect_same_bits(a.value_SI, b.value_SI);
  expect_same_bits(a.u_SI, b.u_SI);
  EXPECT_EQ(a.quality, b.quality);
  EXPECT_EQ(a.time, b.time);
}

void expect_same(const Reason& a, const Reason& b) {
  EXPECT_EQ(a.code, b.code);
  EXPECT_EQ(a.blame, b.blame);
  EXPECT_EQ(std::isnan(a.value_SI), std::isnan(b.value_SI));
  if (!std::isnan(a.value_SI)) {
    expect_same_bits(a.value_SI, b.value_SI);
  }
}

}  // namespace lostwork
