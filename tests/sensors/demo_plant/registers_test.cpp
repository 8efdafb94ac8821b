#include "sensors/demo_plant/registers.h"

#include "sensors/demo_plant/image_bus.h"
#include "sensors/demo_plant/plant_scan.h"

#include <algorithm>
#include <cmath>
#include <string>
#include <variant>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::hours;
using std::chrono::minutes;

const Instant monday = std::chrono::sys_days{std::chrono::June / 1 / 2026};

Plant at_work(std::vector<PlantFault> faults = {}, std::uint64_t seed = 1) {
  Plant plant{
      PlantOptions{.seed = seed, .start = monday, .faults = std::move(faults)}
  };
  plant.step(hours{10});
  return plant;
}

PlantFault ordered(const char* text) {
  return parse_fault(text, plant_fault_targets());
}

std::size_t number_of(std::string_view id) {
  const auto all = instruments();
  return static_cast<std::size_t>(
      std::find_if(all.begin(), all.end(),
                   [id](const Instrument& instrument) { return instrument.point.id == id; }) -
      all.begin());
}

std::uint8_t unit_of(std::string_view device) {
  return std::find_if(plant_devices().begin(), plant_devices().end(),
                      [device](const PlantDevice& d) { return d.id == device; })
      ->unit;
}

BlockAnswer read(const RegisterImage& image, const Instrument& instrument) {
  const auto& from = std::get<FromRegister>(instrument.point.source);
  return answer(image, {.unit = unit_of(from.device),
                        .table = from.at.table,
                        .address = from.at.address,
                        .count = word_count(from.at.type)});
}

TEST(RegisterImage, DecodesToWhatEachInstrumentShows) {
  const Plant plant = at_work();
  const RegisterImage image = register_image(plant);
  for (std::size_t i = 0; i < instruments().size(); ++i) {
    const Instrument& instrument = instruments()[i];
    const auto& spec = std::get<FromRegister>(instrument.point.source).at;
    const BlockAnswer got = read(image, instrument);
    ASSERT_FALSE(got.failure) << instrument.point.id;
    const auto value = decode(spec, got.words);
    ASSERT_TRUE(value) << instrument.point.id;
    const auto expected = shown(plant, i);
    ASSERT_TRUE(expected);
    // Half a step of the register; a float has 24 bits.
    const double step =
        is_integer(spec.type) ? 0.5 * spec.scale * 1.000001 : std::abs(*expected) / 16777216.0;
    EXPECT_NEAR(*value, *expected, step) << instrument.point.id;
  }
}

TEST(RegisterImage, ShowsThatAMachineRuns) {
  const Plant plant = at_work();
  const RegisterImage image = register_image(plant);
  const BlockAnswer status =
      answer(image, {.unit = 1, .table = Table::input, .address = 0, .count = 1});
  ASSERT_FALSE(status.failure);
  EXPECT_EQ(status.words[0] & 3U, 3U);  // ready and running
  const BlockAnswer run_bit =
      answer(image, {.unit = 1, .table = Table::discrete, .address = 0, .count = 1});
  ASSERT_FALSE(run_bit.failure);
  EXPECT_EQ(run_bit.words[0], 1U);
}

TEST(RegisterImage, CountersGrow) {
  Plant plant = at_work();
  RegisterImage image = register_image(plant);
  const BlockRequest energy{.unit = 3, .table = Table::input, .address = 4, .count = 2};
  const auto counted = [&] {
    const auto words = answer(image, energy).words;
    return (std::uint32_t{words[1]} << 16U) | words[0];  // low word first
  };
  const std::uint32_t before = counted();
  plant.step(hours{2});
  refresh(image, plant);
  const double given = plant.truth().counters[0].cold_heat_J / 3.6e6;
  EXPECT_GT(counted(), before);
  EXPECT_NEAR(counted(), given, 0.5);
}

TEST(RegisterImage, RefusesRegistersThatADeviceDoesNotHave) {
  const RegisterImage image = register_image(at_work());
  const BlockAnswer got =
      answer(image, {.unit = 1, .table = Table::input, .address = 13, .count = 20});
  EXPECT_EQ(got.failure, BusFailure::exception);
  EXPECT_EQ(got.exception_code, 2);
}

TEST(RegisterImage, RefusesACountThatTheProtocolForbids) {
  const RegisterImage image = register_image(at_work());
  EXPECT_EQ(
      answer(image, {.unit = 1, .table = Table::input, .address = 0, .count = 126}).exception_code,
      3);
}

TEST(RegisterImage, AnUnknownUnitIsSilent) {
  const RegisterImage image = register_image(at_work());
  EXPECT_EQ(answer(image, {.unit = 99, .table = Table::input, .address = 0, .count = 1}).failure,
            BusFailure::timeout);
}

TEST(RegisterImage, ASilentDeviceLeavesTheOthersAlone) {
  const Plant plant =
      at_work({ordered("device_silent:device=heat-meters,from=2026-06-01,to=2026-06-02")});
  const RegisterImage image = register_image(plant);
  EXPECT_EQ(read(image, instruments()[number_of("ch1_cold_in")]).failure, BusFailure::timeout);
  EXPECT_FALSE(read(image, instruments()[number_of("ch1_suction_p")]).failure);
}

TEST(RegisterImage, ABrokenSensorShowsItsDevicesPattern) {
  const Plant plant = at_work({ordered("sensor_broken:sensor=ch1_liquid_t,from=2026-06-01"),
                               ordered("sensor_broken:sensor=hp1_liquid_t,from=2026-06-01")});
  const RegisterImage image = register_image(plant);
  const Instrument& tenths = instruments()[number_of("ch1_liquid_t")];
  EXPECT_EQ(read(image, tenths).words, std::vector<std::uint16_t>{0x8000U});
  const Instrument& as_float = instruments()[number_of("hp1_liquid_t")];
  const auto& spec = std::get<FromRegister>(as_float.point.source).at;
  EXPECT_EQ(decode(spec, read(image, as_float).words), tl::unexpected{Quality::out_of_range});
}

TEST(ImageBus, ShowsThePlantAsItStands) {
  Plant plant = at_work();
  ImageBus bus{plant};
  const BlockRequest request{.unit = 1, .table = Table::input, .address = 0, .count = 13};
  EXPECT_EQ(bus.read(request).time, plant.time());
  plant.step(minutes{1});
  bus.show(plant);
  EXPECT_EQ(bus.read(request).time, plant.time());
}

struct EncodeCase {
  const char* name;
  RawType type;
  ByteOrder order;
  double value;
};

class Encode : public testing::TestWithParam<EncodeCase> {};

TEST_P(Encode, IsWhatDecodeReadsBack) {
  RegisterSpec spec;
  spec.type = GetParam().type;
  spec.order = GetParam().order;
  spec.scale = 0.5;
  spec.offset = -3.0;
  const EncodedWords encoded = encode(spec, GetParam().value);
  const auto value = decode(spec, std::span{encoded.word}.first(encoded.count));
  ASSERT_TRUE(value);
  EXPECT_EQ(*value, GetParam().value);
}

INSTANTIATE_TEST_SUITE_P(
    Types, Encode,
    testing::Values(EncodeCase{"U16", RawType::u16, ByteOrder::abcd, 1234.5},
                    EncodeCase{"U16Swapped", RawType::u16, ByteOrder::badc, 1234.5},
                    EncodeCase{"S16Negative", RawType::s16, ByteOrder::abcd, -700.5},
                    EncodeCase{"U32", RawType::u32, ByteOrder::abcd, 12345678.0},
                    EncodeCase{"U32LowFirst", RawType::u32, ByteOrder::cdab, 12345678.0},
                    EncodeCase{"S32Negative", RawType::s32, ByteOrder::dcba, -12345678.0},
                    EncodeCase{"F32", RawType::f32, ByteOrder::badc, 0.375},
                    EncodeCase{"F32LowFirst", RawType::f32, ByteOrder::cdab, -1024.25}),
    [](const auto& row) { return std::string{row.param.name}; });

TEST(Encode, AValueThatDoesNotFitIsNoValue) {
  RegisterSpec spec;
  spec.type = RawType::s16;
  spec.sentinels = {0x8000U};
  EXPECT_EQ(encode(spec, 40000.0).word[0], 0x8000U);
  EXPECT_EQ(encode(spec, std::nullopt).word[0], 0x8000U);
}

// The errors of a seed stay within what the plant file declares, for every instrument and 40 seeds.
TEST(Instruments, KeepTheirDeclaredAccuracy) {
  for (std::uint64_t seed = 1; seed <= 40; ++seed) {
    const Plant plant = at_work({}, seed);
    for (std::size_t i = 0; i < instruments().size(); ++i) {
      const Instrument& instrument = instruments()[i];
      if (instrument.point.accuracies.empty()) {
        continue;
      }
      const double truth =
          from_SI(instrument.point.unit, instrument.truth_SI(plant.truth()), plant_altitude_m);
      // standard_u_SI takes a limit as rectangular: u = limit / sqrt(3). Noise beyond the limit is
      // not part of the constant error: six of its standard deviations are let through.
      const double limit =
          std::sqrt(3.0) *
          standard_u_SI(instrument.point.accuracies, instrument.point.unit, truth, 0.0) /
          scale_SI(instrument.point.unit);
      const double noise =
          6.0 * instrument.noise * (instrument.noise_of_reading ? std::abs(truth) : 1.0);
      ASSERT_NEAR(shown(plant, i).value_or(1e9), truth, 0.85 * limit + noise)
          << instrument.point.id << " seed " << seed;
    }
  }
}

TEST(Instruments, APairDiffersByNoMoreThanItsLimit) {
  const std::size_t in = number_of("ch1_cold_in");
  const std::size_t out = number_of("ch1_cold_out");
  for (std::uint64_t seed = 1; seed <= 40; ++seed) {
    const Plant plant = at_work({}, seed);
    const MachineTruth& truth = plant.truth()[PlantMachine::chiller];
    const double difference = *shown(plant, in) - *shown(plant, out);
    const double exact = truth.inlet.cold_in_T_K - truth.cold_out_T_K;
    EXPECT_NEAR(difference, exact, 0.05 + 2.0 * 6.0 * instruments()[in].noise);
  }
}

TEST(Instruments, ADriftAddsUpByTheDay) {
  Plant plant{
      PlantOptions{
                   .seed = 1,
                   .start = monday,
                   .faults = {ordered("sensor_drift:sensor=ch1_hot_out,from=2026-06-01,rate=0.1")}}
  };
  plant.step(std::chrono::days{10});
  Plant healthy{
      PlantOptions{.seed = 1, .start = monday, .faults = {}}
  };
  healthy.step(std::chrono::days{10});
  const std::size_t i = number_of("ch1_hot_out");
  // 0.1 K a day for ten days; a sensor changes nothing in this plant, for its controls use others.
  // The plant's clock begins a millisecond after its start.
  EXPECT_NEAR(*shown(plant, i) - *shown(healthy, i), 1.0, 1e-8);
}

TEST(PlantScan, HasAReadingForEachPointOfTheModel) {
  const Plant plant = at_work();
  for (const PlantMachine machine : {PlantMachine::chiller, PlantMachine::heat_pump}) {
    const MachineModel model = plant_machine_model(machine);
    const Scan scan = plant_scan(plant, machine);
    ASSERT_EQ(scan.readings.size(), model.points.size());
    const auto power = model.index_of(Role::power);
    ASSERT_TRUE(power);
    EXPECT_EQ(scan.readings[*power].quality, Quality::good);
    EXPECT_NEAR(scan.readings[*power].value_SI, plant.truth()[machine].power_W,
                0.02 * plant.truth()[machine].power_W);
  }
}

TEST(PlantScan, TellsASilentDeviceFromABrokenSensor) {
  const Plant plant =
      at_work({ordered("device_silent:device=chiller-power,from=2026-06-01,to=2026-06-02"),
               ordered("sensor_broken:sensor=ch1_liquid_t,from=2026-06-01")});
  const MachineModel model = plant_machine_model(PlantMachine::chiller);
  const Scan scan = plant_scan(plant, PlantMachine::chiller);
  EXPECT_EQ(scan.readings[*model.index_of(Role::power)].quality, Quality::timeout);
  EXPECT_EQ(scan.readings[*model.index_of(Role::liquid_temperature)].quality, Quality::sentinel);
}

}  // namespace
}  // namespace lostwork
