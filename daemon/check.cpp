#include "daemon/check.h"

#include "config/plant_config.h"
#include "config/plant_keys.h"
#include "daemon/arguments.h"
#include "daemon/probe.h"
#include "thermo/cycle/requirements.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <iomanip>
#include <iterator>
#include <sstream>
#include <string>
#include <vector>

namespace lostwork {
namespace {

constexpr std::array options{
    Option{"--config", "FILE",      "the plant file (required but for --keys)"},
    Option{ "--probe",     "", "reads every point once and shows what it says"},
    Option{  "--keys",     "",    "lists every key that a plant file may have"},
};

constexpr CommandLine command{
    .usage = "lostwork check --config FILE [--probe]",
    .purpose =
        "Checks a plant file; says for each machine what its sensors allow, what is missing, and\n"
        "which added sensor would narrow the uncertainty most.",
    .options = options};

void print_keys(std::ostream& out) {
  std::string table;
  for (const KeyRow& row : keys::all()) {
    if (row.table != table) {
      table = row.table;
      out << (out.tellp() > 0 ? "\n" : "") << table << '\n';
    }
    out << "  " << row.key << "\n      " << row.meaning << "\n      " << row.allowed;
    if (!row.standard.empty()) {
      out << (row.standard == "required" ? "; required" : "; default " + row.standard);
    }
    out << '\n';
  }
}

std::string joined(const std::vector<Role>& roles) {
  std::string out;
  for (const Role role : roles) {
    out += (out.empty() ? "" : " and ") + std::string{name(role)};
  }
  return out;
}

std::string percent(double ratio) {
  std::ostringstream out;
  out << std::setprecision(3) << 100.0 * ratio << " %";
  return out.str();
}

// How wide the efficiency's 95 % interval is, of the efficiency itself.
std::string relative_interval(const Measured& efficiency) {
  return "+-" + percent(2.0 * efficiency.u / efficiency.value);
}

void print_sensors(const std::vector<SensorWorth>& sensors, std::ostream& out) {
  constexpr std::size_t most = 3;
  for (std::size_t i = 0; i < sensors.size() && i < most; ++i) {
    const SensorWorth& s = sensors[i];
    out << (s.change == SensorChange::added ? "    adding " : "    a better ") << joined(s.roles);
    if (s.before) {
      out << " would narrow the second-law efficiency from " << relative_interval(*s.before)
          << " to " << relative_interval(s.after) << " (95 %)\n";
    } else {
      out << " would give a second-law efficiency, " << relative_interval(s.after) << " (95 %)\n";
    }
  }
}

void print_machine(const MachineConfig& machine, const Requirements& r, std::ostream& out) {
  out << machine.model.name << " (" << machine.model.id << "): level " << name(r.level) << ", "
      << r.available.size() << " quantities can be computed\n";
  for (const MissingQuantity& missing : r.missing) {
    out << "    without " << info(missing.quantity).name << ": " << text(missing.reason.code);
    if (!missing.reason.blame.empty()) {
      out << " (" << missing.reason.blame << ')';
    }
    out << '\n';
  }
  if (r.next) {
    out << "    for level " << name(r.next->level) << " it needs " << joined(r.next->missing)
        << '\n';
  }
  print_sensors(r.sensors, out);
}

std::string counted(std::size_t number, std::string_view what) {
  return std::to_string(number) + ' ' + std::string{what} + (number == 1 ? "" : "s");
}

// Whether two points are read from one register; it can be deliberate.
bool share_a_register(const PointSpec& a, const PointSpec& b) {
  const auto* at = std::get_if<FromRegister>(&a.source);
  const auto* other = std::get_if<FromRegister>(&b.source);
  return at != nullptr && other != nullptr && at->device == other->device &&
         at->at.table == other->at.table &&
         at->at.address < other->at.address + word_count(other->at.type) &&
         other->at.address < at->at.address + word_count(at->at.type);
}

void print_shared_registers(const std::vector<PointSpec>& points, std::ostream& out) {
  for (auto point = points.begin(); point != points.end(); ++point) {
    const auto next =
        std::find_if(std::next(point), points.end(),
                     [&point](const PointSpec& other) { return share_a_register(*point, other); });
    if (next != points.end()) {
      out << "note: points " << point->id << " and " << next->id
          << " read the same register of device " << std::get<FromRegister>(point->source).device
          << '\n';
    }
  }
}

void print_warnings(const PlantConfig& plant, std::ostream& out) {
  for (const PointSpec& point : plant.wiring.points) {
    if (point.accuracies.empty() && dimension(point.role) != Dimension::state) {
      out << "note: point " << point.id
          << " has no accuracy: its uncertainty counts as that of its digits alone\n";
    }
    if (point.accuracies.size() > 1) {
      out << "note: point " << point.id << " has an accuracy of "
          << counted(point.accuracies.size(), "part")
          << ": they count as independent errors, whose squares add\n";
    }
  }
  print_shared_registers(plant.wiring.points, out);
}

// Whether every machine can be assessed (level L1 or more).
bool print_machines(const PlantConfig& plant, std::ostream& out) {
  bool well = true;
  for (const MachineConfig& machine : plant.machines) {
    const std::vector<std::size_t> points = points_of(plant.wiring, machine.model.id);
    const auto uncertainty = [&plant, &points](std::size_t i, double value_SI) {
      const PointSpec& point = plant.wiring.points[points[i]];
      return standard_u_SI(point.accuracies, point.unit,
                           from_SI(point.unit, value_SI, plant.wiring.altitude_m), quantum(point));
    };
    const auto found = requirements(machine.model, uncertainty);
    if (!found) {
      out << machine.model.name << ": " << text(found.error().code) << " (" << found.error().blame
          << ")\n";
      well = false;
      continue;
    }
    print_machine(machine, *found, out);
    well = well && found->level >= Level::L1;
  }
  return well;
}

void print_safety(const PlantConfig& plant, std::ostream& out) {
  for (const MachineConfig& machine : plant.machines) {
    out << machine.model.name << ": " << machine.limits.size()
        << " safety-relevant set points entered; rules without one are off (not configured)\n";
  }
  out << "This is a monitor, not a protective device. The machines' own safety devices must stay "
         "in "
         "service;\nlocal codes and licensed practice come first.\n";
}

}  // namespace

int check_command(std::span<const std::string_view> arguments, std::ostream& out,
                  std::ostream& err) {
  const auto given = begin_command(command, arguments, out, err);
  if (!given) {
    return given.error();
  }
  if (given->has("--keys")) {
    print_keys(out);
    return 0;
  }
  const auto file = given->value("--config");
  if (!file) {
    err << "lostwork check: --config FILE: is required\n";
    return 2;
  }
  const auto plant = load_plant(*file);
  if (!plant) {
    tell(err, std::string{*file}, plant.error());
    return 2;
  }
  out << *file << ": good; " << counted(plant->machines.size(), "machine") << ", "
      << counted(plant->wiring.points.size(), "point") << '\n';
  print_warnings(*plant, out);
  bool well = print_machines(*plant, out);
  print_safety(*plant, out);
  if (given->has("--probe")) {
    well = probe(plant->wiring, out) && well;
  }
  return well ? 0 : 1;
}

}  // namespace lostwork
