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
    Key<SiteEntry>{      "name",       &SiteEntry::name,"the site, as people call it",  true},
    Key<SiteEntry>{"altitude_m", &SiteEntry::altitude_m,
                   "height above sea level; for gauge pressures", false, -500, 9000},
    Key<SiteEntry>{  "timezone",   &SiteEntry::timezone, "IANA name; for reports, tariffs and pages"      },
};

inline constexpr std::array storage{
    Key<StorageEntry>{    "file",     &StorageEntry::file,"the SQLite file; relative to the plant file"},
    Key<StorageEntry>{ "commit_s", &StorageEntry::commit_s,
                      "what a power cut may lose; 0 = nothing, at the cost of a write each scan",          false, 0, 3600},
};

inline constexpr std::array web{
    Key<WebEntry>{"listen", &WebEntry::listen,
                  "loopback address and port of the page: \"127.0.0.1:8470\""},
};

inline constexpr std::array tariff{
    Key<Tariff>{ "price_per_kWh",  &Tariff::price_per_kWh,           "what a kWh more costs", false, 0, 100                                   },
    Key<Tariff>{      "currency",       &Tariff::currency, "how the price's unit is written"      },
    Key<Tariff>{"co2_kg_per_kWh", &Tariff::co2_kg_per_kWh,              "of the electricity", false, 0,   5},
};

inline constexpr std::array bus{
    Key<BusEntry>{                 "id",                  &BusEntry::id,"a name for this bus",  true                                                                                 },
    Key<BusEntry>{ "kind", &BusEntry::kind,     "how it is reached", false,                                                          0, 0, bus_kinds},
    Key<BusEntry>{ "address", &BusEntry::address,
                  "\"192.0.2.7:502\" (numeric), or the serial device",  true                                  },
    Key<BusEntry>{ "baud", &BusEntry::baud,      "of a serial line", false,                                                                         1200, 115200},
    Key<BusEntry>{ "parity", &BusEntry::parity,      "of a serial line", false,                                                                         0, 0, parities},
    Key<BusEntry>{ "stop_bits", &BusEntry::stop_bits,      "of a serial line", false,                                                          1, 2},
    Key<BusEntry>{ "response_timeout_ms", &BusEntry::response_timeout_ms,
                  "how long an answer may take", false,                                                10, 10000},
    Key<BusEntry>{ "pause_ms", &BusEntry::pause_ms,
                  "from an answer to the next request; some devices fall over when asked faster", false,0, 10000},
};

inline constexpr std::array device{
    Key<DeviceEntry>{         "id",          &DeviceEntry::id,"a name for this device",true                                                                           },
    Key<DeviceEntry>{ "bus", &DeviceEntry::bus,                      "id of its bus",  true},
    Key<DeviceEntry>{ "unit", &DeviceEntry::unit,             "Modbus unit identifier", false,                                      0, 255},
    Key<DeviceEntry>{ "addresses", &DeviceEntry::addresses, "how its document numbers registers",
                     false,                                           0, 0, notations},
    Key<DeviceEntry>{ "largest_gap", &DeviceEntry::largest_gap,
                     "registers without a point that may be read along to save a request", false,                                                       0,
                     120},
};

inline constexpr std::string_view stream_form =
    R"({ fluid = "water" }, { fluid = "propylene glycol 30 %" } or { rho_cp_J_m3K = 4.18e6 })";

inline constexpr std::array machine{
    Key<MachineEntry>{                      "id",                       &MachineEntry::id,"a name for files and addresses",true},
    Key<MachineEntry>{                    "name",                     &MachineEntry::name,              "as people call it",  true},
    Key<MachineEntry>{                    "duty",                     &MachineEntry::duty,            "what it is paid for", false, 0, 0, duties},
    Key<MachineEntry>{                    "kind",                     &MachineEntry::kind,                    "its circuit", false, 0, 0, machine_kinds},
    Key<MachineEntry>{              "evaporator",               &MachineEntry::evaporator,       "dry expansion or flooded", false, 0,
                      0, evaporators},
    Key<MachineEntry>{             "refrigerant",              &MachineEntry::refrigerant,    "see `lostwork props --list`",
                      true},
    Key<MachineEntry>{                  "scan_s",                   &MachineEntry::scan_s,               "period of a scan", false, 1, 3600},
    Key<MachineEntry>{          "rated_power_kW",           &MachineEntry::rated_power_kW,       "electrical, at full load",
                      true, 0.01, 100000},
    Key<MachineEntry>{             "casing_loss",                                 Other{},
                      "heat from the casing as a share of the power, where it cannot be measured: "
                      "{ fraction = 0.05, limit = 0.05 }"      },
    Key<MachineEntry>{"casing_surroundings_degC", &MachineEntry::casing_surroundings_degC,
                      "temperature around the casing", false, -50, 70},
    Key<MachineEntry>{                  "accept",                   &MachineEntry::accept,
                      "take what is learned as healthy without a person", false, 0, 0, acceptances},
    Key<MachineEntry>{             "cold_stream",                                 Other{},                      stream_form      },
    Key<MachineEntry>{              "hot_stream",                                 Other{},                      stream_form      },
};

inline constexpr std::array pair{
    Key<PairEntry>{        "id", &PairEntry::id,"as the points of the pair name it", true                                            },
    Key<PairEntry>{"difference",        Other{},
                   "accuracy of the difference of the two: { limit = 0.1 } in K", true},
};

inline constexpr std::array point{
    Key<PointEntry>{"id",              &PointEntry::id,"a name; the column of a CSV",true},
    Key<PointEntry>{    "machine",         &PointEntry::machine,                                  "id of its machine",  true},
    Key<PointEntry>{    "circuit",         &PointEntry::circuit,                                "refrigerant circuit", false, 1, 1},
    Key<PointEntry>{       "role",            &PointEntry::role,          "what it measures: \"cold.in.temperature\"",  true},
    Key<PointEntry>{       "unit",            &PointEntry::unit,                "of the value after scale and offset",  true},
    Key<PointEntry>{
                    "accuracy",                      Other{},
                    "one or several of { class = \"Pt100 A\" }, { limit = X }, { percent_of_reading = X }, "
                    "{ percent_of_span = X, span = [a, b] }, { u = X }; a limit is rectangular; "
                    "several parts are independent errors, whose squares add"      },
    Key<PointEntry>{       "pair",            &PointEntry::pair,
                    "points of one pair share the common part of their error"      },
    Key<PointEntry>{     "device",          &PointEntry::device,
                    "id of the device; left out: comes from a CSV only"      },
    Key<PointEntry>{   "register", &PointEntry::register_number,                "its number in the device's notation",
                    false, 0, 465535},
    Key<PointEntry>{      "table",           &PointEntry::table,                    "which of the four Modbus tables", false, 0, 0,
                    register_tables},
    Key<PointEntry>{       "type",            &PointEntry::type,                             "how its words are read", false, 0, 0,
                    register_types},
    Key<PointEntry>{      "order",           &PointEntry::order,                          "of the bytes of two words", false, 0, 0, orders},
    Key<PointEntry>{      "scale",           &PointEntry::scale,                       "value = raw * scale + offset", false, -1e9, 1e9},
    Key<PointEntry>{     "offset",          &PointEntry::offset,                       "value = raw * scale + offset", false, -1e9,
                    1e9},
    Key<PointEntry>{  "sentinels",                      Other{}, "raw values that mean \"none\": [0x8000], [-9999.0]"      },
    Key<PointEntry>{      "range",                      Other{},            "what it can be, in its unit: [-40, 150]"      },
    Key<PointEntry>{      "value",           &PointEntry::value,                   "a constant instead of a register", false, -1e9,
                    1e9},
    Key<PointEntry>{         "at",              &PointEntry::at,                     "where a volume flow is metered", false, 0, 0, places},
    Key<PointEntry>{"corrections",                      Other{},
                    "from a calibration: [{ from = 2026-03-01, add = 0.12 }], in its unit"      },
};

inline constexpr std::array safety_limit{
    Key<SafetyLimitEntry>{     "machine",      &SafetyLimitEntry::machine,             "id of the machine",true},
    Key<SafetyLimitEntry>{        "kind",         &SafetyLimitEntry::kind,                  "which advice", true, 0, 0,
                          safety_kinds},
    Key<SafetyLimitEntry>{       "limit",        &SafetyLimitEntry::limit, "the set point in the document", true,
                          -1e6, 1e6},
    Key<SafetyLimitEntry>{        "unit",         &SafetyLimitEntry::unit,                  "of the limit", true},
    Key<SafetyLimitEntry>{    "document",     &SafetyLimitEntry::document,        "where the limit stands", true},
    Key<SafetyLimitEntry>{"jurisdiction", &SafetyLimitEntry::jurisdiction,            "whose code applies",
                          true},
    Key<SafetyLimitEntry>{  "entered_by",   &SafetyLimitEntry::entered_by,                "who entered it"     },
};

// Every key of the file, in its order, for `lostwork check --keys`.
[[nodiscard]] std::vector<KeyRow> all();

}  // namespace lostwork::keys
