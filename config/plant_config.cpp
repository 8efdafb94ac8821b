#include "config/plant_config.h"

#include "config/listen_address.h"
#include "config/pairs.h"
#include "config/point_entry.h"
#include "thermo/fluids/fluid.h"

#include <algorithm>
#include <cerrno>
#include <cmath>
#include <date/tz.h>
#include <fstream>
#include <set>
#include <sstream>
#include <system_error>

namespace lostwork {
namespace {

constexpr double kilo = 1e3;

Span milliseconds(double ms) {
  return Span{std::llround(ms)};
}

template <class Entries>
void refuse_doubles(const Entries& entries, Problems& problems) {
  std::set<std::string_view> seen;
  for (const auto& entry : entries) {
    if (!seen.insert(entry.id).second) {
      refuse(problems, entry.place, "id", "each id only once");
    }
  }
}

template <class Entries>
bool has_id(const Entries& entries, std::string_view id) {
  return std::any_of(entries.begin(), entries.end(), [id](const auto& e) { return e.id == id; });
}

template <class Entries>
std::string ids_of(const Entries& entries) {
  std::string out;
  for (const auto& entry : entries) {
    out += (out.empty() ? "" : ", ") + entry.id;
  }
  return out.empty() ? "none is declared" : "one of " + out;
}

bool knows_timezone(const std::string& name) {
  try {
    return date::locate_zone(name) != nullptr;
  } catch (const std::runtime_error&) {
    return false;
  }
}

BusOptions bus_options(const BusEntry& entry, Problems& problems) {
  BusOptions out;
  out.id = entry.id;
  out.kind = bus_kind_named(entry.kind).value_or(BusKind::tcp);
  out.timeout = milliseconds(entry.response_timeout_ms);
  out.pause = milliseconds(entry.pause_ms);
  if (out.kind == BusKind::rtu) {
    out.serial = {.device = entry.address,
                  .baud = static_cast<int>(entry.baud),
                  .parity = parity_named(entry.parity).value_or(Parity::even),
                  .stop_bits = static_cast<int>(entry.stop_bits)};
    return out;
  }
  if (const auto endpoint = tcp_endpoint(entry.address)) {
    out.tcp = *endpoint;
  } else if (entry.place.sound("kind")) {
    refuse(problems, entry.place, "address", endpoint.error());
  }
  return out;
}

// What the reader's ranges let through and the bus would refuse.
void check_bus(const BusEntry& entry, const BusOptions& bus, Problems& problems) {
  const auto fault = fault_of(bus);
  if (fault && entry.place.sound("address")) {
    refuse(problems, entry.place, bus.kind == BusKind::rtu ? "baud" : "kind", *fault);
  }
}

DeviceOptions device_options(const DeviceEntry& entry, const PlantFile& file, Problems& problems) {
  if (!has_id(file.buses, entry.bus) && !may_mean(file, "bus", file.buses)) {
    refuse(problems, entry.place, "bus", ids_of(file.buses));
  }
  DeviceOptions out;
  out.id = entry.id;
  out.bus = entry.bus;
  out.unit = static_cast<std::uint8_t>(entry.unit);
  out.addresses = notation_named(entry.addresses).value_or(Notation::zero_based);
  out.max_gap = static_cast<std::uint16_t>(entry.largest_gap);
  return out;
}

ModelStream model_stream(const StreamEntry& entry, Problems& problems) {
  if (entry.fluid && entry.rho_cp_J_m3K) {
    refuse(problems, entry.place, "rho_cp_J_m3K", "not both: a fluid, or a heat capacity");
    return {};
  }
  if (entry.rho_cp_J_m3K) {
    return {
        .fluid = ConstantStream{.rho_cp_SI = *entry.rho_cp_J_m3K, .rho_kgm3 = 1000.0}
    };
  }
  const auto fluid = stream_named(entry.fluid.value_or("water"));
  if (!fluid) {
    refuse(problems, entry.place, "fluid",
           R"("water", or a solution by mass like "propylene glycol 30 %": )" + brine_names());
    return {};
  }
  return {.fluid = *fluid};
}

std::string fluid_names() {
  std::string out = "a fluid of `lostwork props --list`:";
  for (const Fluid* fluid : fluids()) {
    out += ' ' + std::string{fluid->name};
  }
  return out;
}

MachineConfig machine_config(const MachineEntry& entry, Problems& problems) {
  MachineConfig out;
  out.accept_unattended = entry.accept == "unattended";
  MachineModel& model = out.model;
  model.id = entry.id;
  model.name = entry.name;
  model.duty = entry.duty == "heating" ? Duty::heating : Duty::cooling;
  model.evaporator = entry.evaporator == "flooded" ? EvaporatorKind::flooded : EvaporatorKind::dry;
  model.refrigerant = fluid_named(entry.refrigerant);
  if (model.refrigerant == nullptr) {
    refuse(problems, entry.place, "refrigerant", fluid_names());
  }
  model.cold = model_stream(entry.cold_stream, problems);
  model.hot = model_stream(entry.hot_stream, problems);
  model.rated_power_W = entry.rated_power_kW * kilo;
  model.casing_loss = {.value = entry.casing_loss.fraction,
                       .u = entry.casing_loss.limit / std::sqrt(3.0)};
  if (entry.casing_surroundings_degC) {
    model.casing_T_K = to_SI(Unit::degC, *entry.casing_surroundings_degC, 0.0);
  }
  model.scan_period = milliseconds(entry.scan_s * kilo);
  return out;
}

void refuse_double_roles(const PlantFile& file, Problems& problems) {
  std::set<std::pair<std::string_view, Role>> seen;
  for (const PointEntry& entry : file.points) {
    const auto role = role_named(entry.role);
    if (role && has_id(file.machines, entry.machine) &&
        !seen.insert({entry.machine, *role}).second) {
      refuse(problems, entry.place, "role", "each role of a machine only once");
    }
  }
}

struct ReadPoints {
  std::vector<std::optional<PointSpec>> specs;  // of each point of the file, in its order
  std::vector<PairShare> shares;
};

ReadPoints read_points(const PlantFile& file, const Wiring& wiring, Problems& problems) {
  ReadPoints out;
  for (const PointEntry& entry : file.points) {
    if (!has_id(file.machines, entry.machine) && !may_mean(file, "machine", file.machines)) {
      refuse(problems, entry.place, "machine", ids_of(file.machines));
    }
    out.specs.push_back(point_spec(entry, file, wiring, problems));
  }
  refuse_double_roles(file, problems);
  out.shares = pair_shares(file, out.specs, problems);
  return out;
}

// Adds the points of one machine to its model and to the wiring.
void add_points(MachineConfig& machine, const PlantFile& file, const ReadPoints& points,
                Wiring& wiring) {
  for (std::size_t i = 0; i < file.points.size(); ++i) {
    const PointEntry& entry = file.points[i];
    if (entry.machine != machine.model.id || !points.specs[i]) {
      continue;
    }
    const PointSpec& spec = *points.specs[i];
    if (entry.at == "out" && spec.role == Role::cold_flow) {
      machine.model.cold.flow_at = FlowPlace::out;
    }
    if (entry.at == "out" && spec.role == Role::hot_flow) {
      machine.model.hot.flow_at = FlowPlace::out;
    }
    machine.model.points.push_back({.id = entry.id,
                                    .role = spec.role,
                                    .circuit = spec.circuit,
                                    .mass_flow = spec.unit == Unit::kg_s,
                                    .pair = points.shares[i].pair,
                                    .accuracy_known = !entry.accuracy.empty(),
                                    .shared_variance = points.shares[i].variance});
    wiring.points.push_back(spec);
  }
}

SafetyKind safety_kind(const std::string& kind) {
  if (kind == "high_pressure") {
    return SafetyKind::high_pressure;
  }
  if (kind == "freezing") {
    return SafetyKind::freezing;
  }
  return kind == "oxygen" ? SafetyKind::oxygen : SafetyKind::refrigerant_detector;
}

// A role of the same dimension stands for the unit check.
Role role_like(const std::string& kind) {
  switch (safety_kind(kind)) {
    case SafetyKind::high_pressure: return Role::discharge_pressure;
    case SafetyKind::freezing: return Role::suction_temperature;
    case SafetyKind::oxygen: return Role::oxygen;
    default: return Role::leak_concentration;
  }
}

void add_safety_limit(const SafetyLimitEntry& entry, const PlantFile& file, PlantConfig& plant,
                      Problems& problems) {
  const auto unit = unit_named(entry.unit);
  if (!unit || (entry.place.sound("kind") && !allowed(*unit, role_like(entry.kind)))) {
    refuse(problems, entry.place, "unit", "a unit that fits kind \"" + entry.kind + '"');
  }
  const auto machine =
      std::find_if(plant.machines.begin(), plant.machines.end(),
                   [&entry](const MachineConfig& m) { return m.model.id == entry.machine; });
  if (machine == plant.machines.end()) {
    if (!may_mean(file, "machine", file.machines)) {
      refuse(problems, entry.place, "machine", ids_of(file.machines));
    }
    return;
  }
  const SafetyKind kind = safety_kind(entry.kind);
  if (entry.place.sound("kind") &&
      std::any_of(machine->limits.begin(), machine->limits.end(),
                  [kind](const SafetyLimit& l) { return l.kind == kind; })) {
    refuse(problems, entry.place, "kind", "each kind only once for a machine");
  }
  std::ostringstream entered;
  entered << entry.limit << ' ' << entry.unit;
  machine->limits.push_back(
      {.kind = kind,
       .machine = entry.machine,
       .limit_SI = unit ? to_SI(*unit, entry.limit, plant.wiring.altitude_m) : 0.0,
       .entered = entered.str(),
       .document = entry.document,
       .jurisdiction = entry.jurisdiction,
       .entered_by = entry.entered_by.value_or("")});
}

void check_names(const PlantFile& file, Problems& problems) {
  refuse_doubles(file.buses, problems);
  refuse_doubles(file.devices, problems);
  refuse_doubles(file.machines, problems);
  refuse_doubles(file.pairs, problems);
  refuse_doubles(file.points, problems);
  if (file.machines.empty() && file.place.sound("machine")) {
    problems.push_back({.line = 0,
                        .key = "[[machine]]",
                        .found = {},
                        .allowed = "at least one machine is required"});
  }
  if (!knows_timezone(file.site.timezone)) {
    refuse(problems, file.site.place, "timezone", "an IANA time zone, as \"Europe/London\"");
  }
  if (const auto listen = listen_address(file.web.listen); !listen) {
    refuse(problems, file.web.place, "listen", listen.error());
  }
}

// What the tables mean together: names that must exist, units that fit roles, registers that exist.
PlantConfig plant_from(const PlantFile& file, Problems& problems) {
  check_names(file, problems);
  PlantConfig plant;
  plant.site = file.site.name;
  plant.timezone = file.site.timezone;
  plant.database = file.storage.file;
  plant.commit = milliseconds(file.storage.commit_s * kilo);
  plant.listen = file.web.listen;
  plant.tariff = file.tariff;
  plant.wiring.altitude_m = file.site.altitude_m;
  for (const BusEntry& entry : file.buses) {
    plant.wiring.buses.push_back(bus_options(entry, problems));
    check_bus(entry, plant.wiring.buses.back(), problems);
  }
  for (const DeviceEntry& entry : file.devices) {
    plant.wiring.devices.push_back(device_options(entry, file, problems));
  }
  const ReadPoints points = read_points(file, plant.wiring, problems);
  for (const MachineEntry& entry : file.machines) {
    plant.machines.push_back(machine_config(entry, problems));
    MachineConfig& machine = plant.machines.back();
    plant.wiring.machines.push_back({.machine = entry.id, .period = machine.model.scan_period});
    add_points(machine, file, points, plant.wiring);
  }
  for (const SafetyLimitEntry& entry : file.safety_limits) {
    add_safety_limit(entry, file, plant, problems);
  }
  return plant;
}

}  // namespace

tl::expected<PlantConfig, Problems> read_plant(std::string_view text, std::string_view name) {
  Problems problems;
  PlantConfig plant;
  if (const auto file = read_plant_file(text, name, problems)) {
    plant = plant_from(*file, problems);
  }
  if (!problems.empty()) {
    std::stable_sort(problems.begin(), problems.end(),
                     [](const Problem& a, const Problem& b) { return a.line < b.line; });
    return tl::unexpected{std::move(problems)};
  }
  plant.text = text;
  return plant;
}

tl::expected<PlantConfig, Problems> load_plant(const std::filesystem::path& path) {
  std::ifstream in{path};
  std::ostringstream text;
  if (!in || !(text << in.rdbuf())) {
    return tl::unexpected{
        Problems{{.line = 0,
                  .key = "the file",
                  .found = {},
                  .allowed = "cannot be read: " + std::generic_category().message(errno)}}};
  }
  return read_plant(text.str(), path.string()).map([&path](PlantConfig plant) {
    if (plant.database.is_relative()) {
      plant.database = path.parent_path() / plant.database;
    }
    return plant;
  });
}

}  // namespace lostwork
