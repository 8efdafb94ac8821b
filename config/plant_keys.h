// Every key of the plant file, declared once: reader, checks, defaults and the printed list use
// these tables.
#pragma once

#include "config/key_table.h"
#include "config/plant_file.h"

#include <array>
#include <span>
#include <string>
#include <vector>

namespace lostwork::keys {

using namespace std::string_view_literals;

inline constexpr std::array bus_kinds{"tcp"sv, "rtu"sv, "rtu_over_tcp"sv};
inline constexpr std::array parities{"none"sv, "even"sv, "odd"sv};
inline constexpr std::array notations{"zero_based"sv, "one_based"sv, "modicon"sv};
inline constexpr std::array duties{"cooling"sv, "heating"sv};
inline constexpr std::array machine_kinds{"single_stage"sv};
inline constexpr std::array evaporators{"dry"sv, "flooded"sv};
inline constexpr std::array acceptances{"unattended"sv};
inline constexpr std::array register_tables{"holding"sv, "input"sv, "coil"sv, "discrete"sv};
inline constexpr std::array register_types{"u16"sv, "s16"sv, "u32"sv, "s32"sv, "f32"sv};
inline constexpr std::array orders{"ABCD"sv, "CDAB"sv, "BADC"sv, "DCBA"sv};
inline constexpr std::array places{"in"sv, "out"sv};
inline constexpr std::array safety_kinds{"high_pressure"sv, "freezing"sv, "refrigerant_detector"sv,
                                         "oxygen"sv};

inline constexpr std::array site{
    Key<SiteOptions>{      "name",       &SiteOptions::name,"the site, as people call it",  true},
    Key<SiteOptions>{"altitude_m", &SiteOptions::altitude_m,
                     "height above sea level; for gauge pressures", false, -500, 9000},
    Key<SiteOptions>{  "timezone",   &SiteOptions::timezone,
                     "IANA name; for reports, tariffs and pages"      },
};

inline constexpr std::array storage{
    Key<StorageOptions>{    "file",     &StorageOptions::file,
                        "the SQLite file; relative to the plant file"},
    Key<StorageOptions>{ "commit_s", &StorageOptions::commit_s,
                        "what a power cut may lose; 0 = nothing, at the cost of a write each scan",                               false, 0, 3600},
};

inline constexpr std::array web{
    Key<WebOptions>{"listen", &WebOptions::listen,
                    "loopback address and port of the page: \"127.0.0.1:8470\""},
};

inline constexpr std::array tariff{
    Key<Tariff>{ "price_per_kWh",  &Tariff::price_per_kWh,           "what a kWh more costs", false, 0, 100                                   },
    Key<Tariff>{      "currency",       &Tariff::currency, "how the price's unit is written"      },
    Key<Tariff>{"co2_kg_per_kWh", &Tariff::co2_kg_per_kWh,              "of the electricity", false, 0,   5},
};

inline constexpr std::array bus{
    Key<BusOptions>{                 "id",                  &BusOptions::id,"a name for this bus",  true                                                   },
    Key<BusOptions>{ "kind", &BusOptions::kind,   "how it is reached", false,                          0, 0, bus_kinds},
    Key<BusOptions>{ "address", &BusOptions::address,
                    "\"192.0.2.7:502\" (numeric), or the serial device",  true},
    Key<BusOptions>{ "baud", &BusOptions::baud,    "of a serial line", false,                                       1200, 115200},
    Key<BusOptions>{ "parity", &BusOptions::parity,    "of a serial line", false,                                       0, 0, parities},
    Key<BusOptions>{ "stop_bits", &BusOptions::stop_bits,    "of a serial line", false,                          1, 2},
    Key<BusOptions>{ "response_timeout_ms", &BusOptions::response_timeout_ms,
                    "how long an answer may take", false,              10, 10000},
};

inline constexpr std::array device{
    Key<DeviceOptions>{         "id",          &DeviceOptions::id,"a name for this device",true                                                                             },
    Key<DeviceOptions>{ "bus", &DeviceOptions::bus,                      "id of its bus",  true},
    Key<DeviceOptions>{ "unit", &DeviceOptions::unit,             "Modbus unit identifier", false,                                      0, 255},
    Key<DeviceOptions>{ "addresses", &DeviceOptions::addresses, "how its document numbers registers",
                       false,                                           0, 0, notations},
    Key<DeviceOptions>{ "largest_gap", &DeviceOptions::largest_gap,
                       "registers without a point that may be read along to save a request", false,                                             0, 120},
};

inline constexpr std::array machine{
    Key<MachineOptions>{"id",                       &MachineOptions::id,"a name for files and addresses",true},
    Key<MachineOptions>{                    "name",                     &MachineOptions::name,              "as people call it",  true},
    Key<MachineOptions>{                    "duty",                     &MachineOptions::duty,            "what it is paid for", false, 0, 0, duties},
    Key<MachineOptions>{                    "kind",                     &MachineOptions::kind,                    "its circuit", false, 0, 0, machine_kinds},
    Key<MachineOptions>{              "evaporator",               &MachineOptions::evaporator,       "dry expansion or flooded",
                        false, 0, 0, evaporators},
    Key<MachineOptions>{             "refrigerant",              &MachineOptions::refrigerant,    "see `lostwork props --list`",
                        true},
    Key<MachineOptions>{                  "scan_s",                   &MachineOptions::scan_s,               "period of a scan", false, 1, 75},
    Key<MachineOptions>{          "rated_power_kW",           &MachineOptions::rated_power_kW,
                        "electrical, at full load",  true, 0.01, 100000},
    Key<MachineOptions>{
                        "casing_loss",                                   Other{},
                        "heat from the casing as a share of the power, where it cannot be measured: "
                        "{ fraction = 0.05, limit = 0.05 }"      },
    Key<MachineOptions>{"casing_surroundings_degC", &MachineOptions::casing_surroundings_degC,
                        "temperature around the casing", false, -50, 70},
    Key<MachineOptions>{                  "accept",                   &MachineOptions::accept,
                        "take what is learned as healthy without a person", false, 0, 0,
                        acceptances},
    Key<MachineOptions>{             "cold_stream",                                   Other{},
                        "{ fluid = \"water\" } or { rho_cp_J_m3K = 4.18e6 }"      },
    Key<MachineOptions>{              "hot_stream",                                   Other{},
                        "{ fluid = \"water\" } or { rho_cp_J_m3K = 4.18e6 }"      },
};

inline constexpr std::array pair{
    Key<PairOptions>{        "id", &PairOptions::id,"as the points of the pair name it", true                                              },
    Key<PairOptions>{"difference",          Other{},
                     "accuracy of the difference of the two: { limit = 0.1 } in K", true},
};

inline constexpr std::array point{
    Key<PointOptions>{"id",              &PointOptions::id,"a name; the column of a CSV",true},
    Key<PointOptions>{    "machine",         &PointOptions::machine,                           "id of its machine",  true},
    Key<PointOptions>{    "circuit",         &PointOptions::circuit,                         "refrigerant circuit", false, 1, 1},
    Key<PointOptions>{       "role",            &PointOptions::role,   "what it measures: \"cold.in.temperature\"",
                      true},
    Key<PointOptions>{       "unit",            &PointOptions::unit,         "of the value after scale and offset",  true},
    Key<PointOptions>{
                      "accuracy",                        Other{},
                      "one or several of { class = \"Pt100 A\" }, { limit = X }, { percent_of_reading = X }, "
                      "{ percent_of_span = X, span = [a, b] }, { u = X }; a limit is rectangular"      },
    Key<PointOptions>{       "pair",            &PointOptions::pair,
                      "points of one pair share the common part of their error"      },
    Key<PointOptions>{     "device",          &PointOptions::device,
                      "id of the device; left out: comes from a CSV only"      },
    Key<PointOptions>{   "register", &PointOptions::register_number,
                      "its number in the device's notation", false, 0, 465535},
    Key<PointOptions>{      "table",           &PointOptions::table,             "which of the four Modbus tables", false, 0, 0,
                      register_tables},
    Key<PointOptions>{       "type",            &PointOptions::type,                      "how its words are read", false, 0, 0,
                      register_types},
    Key<PointOptions>{      "order",           &PointOptions::order,                   "of the bytes of two words", false, 0, 0,
                      orders},
    Key<PointOptions>{      "scale",           &PointOptions::scale,                "value = raw * scale + offset", false, -1e9,
                      1e9},
    Key<PointOptions>{     "offset",          &PointOptions::offset,                "value = raw * scale + offset", false, -1e9,
                      1e9},
    Key<PointOptions>{  "sentinels",                        Other{},     "raw values that mean \"none\": [0x8000]"      },
    Key<PointOptions>{      "range",                        Other{},     "what it can be, in its unit: [-40, 150]"      },
    Key<PointOptions>{      "value",           &PointOptions::value,            "a constant instead of a register", false,
                      -1e9, 1e9},
    Key<PointOptions>{         "at",              &PointOptions::at,              "where a volume flow is metered", false, 0, 0,
                      places},
    Key<PointOptions>{"corrections",                        Other{},
                      "from a calibration: [{ from = 2026-03-01, add = 0.12 }], in its unit"      },
};

inline constexpr std::array safety_limit{
    Key<SafetyLimitOptions>{     "machine",      &SafetyLimitOptions::machine,             "id of the machine",true},
    Key<SafetyLimitOptions>{        "kind",         &SafetyLimitOptions::kind,                  "which advice", true, 0, 0,
                            safety_kinds},
    Key<SafetyLimitOptions>{       "limit",        &SafetyLimitOptions::limit, "the set point in the document",
                            true, -1e6, 1e6},
    Key<SafetyLimitOptions>{        "unit",         &SafetyLimitOptions::unit,                  "of the limit", true},
    Key<SafetyLimitOptions>{    "document",     &SafetyLimitOptions::document,        "where the limit stands",
                            true},
    Key<SafetyLimitOptions>{"jurisdiction", &SafetyLimitOptions::jurisdiction,            "whose code applies",
                            true},
    Key<SafetyLimitOptions>{  "entered_by",   &SafetyLimitOptions::entered_by,                "who entered it"     },
};

// Every key of the file, in its order, for `lostwork check --keys`.
[[nodiscard]] std::vector<KeyRow> all();

}  // namespace lostwork::keys
