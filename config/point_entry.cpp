#include "config/point_entry.h"

#include "config/plant_config.h"
#include "config/toml_reader.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

class PointReader {
 public:
  PointReader(const PointEntry& entry, const Wiring& wiring, Problems& problems)
      : entry_{entry}, wiring_{wiring}, problems_{problems} {}

  PointSpec read() {
    PointSpec out;
    out.id = entry_.id;
    out.machine = entry_.machine;
    out.circuit = static_cast<int>(entry_.circuit);
    out.role = role();
    out.unit = unit(out.role);
    out.accuracies = accuracies(entry_.accuracy, out.unit);
    out.pair = entry_.pair.value_or("");
    if (entry_.range) {
      out.range = PointRange{.min = (*entry_.range)[0], .max = (*entry_.range)[1]};
    }
    for (const CorrectionEntry& c : entry_.corrections) {
      out.calibrations.push_back({.from = c.from, .offset = c.add});
    }
    out.source = source();
    return out;
  }

  [[nodiscard]] bool refused() const { return refused_; }

  std::vector<Accuracy> accuracies(const std::vector<AccuracyEntry>& entries, Unit unit) {
    std::vector<Accuracy> out;
    for (const AccuracyEntry& entry : entries) {
      add_parts(entry, out);
    }
    for (const Accuracy& one : out) {
      if (!allowed(one, unit)) {
        refuse("accuracy", std::string{name(unit)}, "a Pt100 class belongs to a temperature");
      }
    }
    return out;
  }

 private:
  void refuse(std::string_view key, std::string found, std::string allowed) {
    refused_ = true;
    problems_.push_back({.line = entry_.line,
                         .key = "point \"" + entry_.id + "\"." + std::string{key},
                         .found = std::move(found),
                         .allowed = std::move(allowed)});
  }

  Role role() {
    const auto found = role_named(entry_.role);
    if (!found) {
      std::string roles = "one of";
      for (std::size_t i = 0; i < static_cast<std::size_t>(Role::count); ++i) {
        roles += ' ' + std::string{name(static_cast<Role>(i))};
      }
      refuse("role", entry_.role, roles);
    }
    return found.value_or(Role::mode);
  }

  Unit unit(Role role) {
    const auto found = unit_named(entry_.unit);
    if (found && allowed(*found, role)) {
      return *found;
    }
    std::string units = "for " + entry_.role + " one of";
    for (std::size_t i = 0; i < static_cast<std::size_t>(Unit::count); ++i) {
      if (allowed(static_cast<Unit>(i), role)) {
        units += ' ' + std::string{name(static_cast<Unit>(i))};
      }
    }
    refuse("unit", entry_.unit, units);
    return Unit::one;
  }

  void add_parts(const AccuracyEntry& entry, std::vector<Accuracy>& out) {
    if (entry.sensor_class) {
      if (const auto found = pt100_class_named(*entry.sensor_class)) {
        out.emplace_back(*found);
      } else {
        refuse("accuracy.class", *entry.sensor_class,
               R"(one of "Pt100 AA", "Pt100 A", "Pt100 B", "Pt100 C")");
      }
    }
    if (entry.limit) {
      out.emplace_back(AccuracyLimit{.limit = *entry.limit});
    }
    if (entry.percent_of_reading) {
      out.emplace_back(PercentOfReading{.percent = *entry.percent_of_reading});
    }
    if (entry.percent_of_span) {
      out.emplace_back(PercentOfSpan{
          .percent = *entry.percent_of_span, .low = (*entry.span)[0], .high = (*entry.span)[1]});
    }
    if (entry.u) {
      out.emplace_back(StandardUncertainty{.u = *entry.u});
    }
  }

  PointSource source() {
    if (entry_.value) {
      if (entry_.device || entry_.register_number) {
        refuse("value", number_text(*entry_.value),
               "either a constant value or a register, not both");
      }
      return Constant{.value = *entry_.value};
    }
    if (!entry_.device) {
      if (entry_.register_number) {
        refuse("register", std::to_string(*entry_.register_number),
               "needs device, the id of the device it is in");
      }
      return FileOnly{};
    }
    return from_register();
  }

  PointSource from_register() {
    const auto device =
        std::find_if(wiring_.devices.begin(), wiring_.devices.end(),
                     [this](const DeviceOptions& d) { return d.id == *entry_.device; });
    if (device == wiring_.devices.end()) {
      refuse("device", *entry_.device, "the id of a device");
      return FileOnly{};
    }
    if (!entry_.register_number) {
      refuse("register", "", "is required with device: the number in its document");
      return FileOnly{};
    }
    RegisterSpec spec;
    spec.table = table_named(entry_.table).value_or(Table::holding);
    spec.type =
        holds_bits(spec.table) ? RawType::bit : raw_type_named(entry_.type).value_or(RawType::u16);
    spec.order = byte_order_named(entry_.order).value_or(ByteOrder::abcd);
    spec.scale = entry_.scale;
    spec.offset = entry_.offset;
    add_sentinels(spec);
    const auto address = wire_address(device->addresses, spec.table, *entry_.register_number);
    if (!address) {
      refuse("register", std::to_string(*entry_.register_number), address.error());
      return FileOnly{};
    }
    spec.address = *address;
    if (const auto fault = fault_of(spec)) {
      refuse("register", std::to_string(*entry_.register_number), *fault);
    }
    return FromRegister{.device = *entry_.device, .at = std::move(spec)};
  }

  static std::string sentinel_text(const std::variant<std::int64_t, double>& written) {
    return std::visit([](auto value) { return number_text(static_cast<double>(value)); }, written);
  }

  void add_sentinels(RegisterSpec& spec) {
    for (const auto& written : entry_.sentinels) {
      const auto pattern =
          std::visit([&spec](auto value) { return bit_pattern(spec.type, value); }, written);
      if (pattern) {
        spec.sentinels.push_back(*pattern);
      } else {
        refuse("sentinels", sentinel_text(written), "raw values that fit the type " + entry_.type);
      }
    }
  }

  const PointEntry& entry_;
  const Wiring& wiring_;
  Problems& problems_;
  bool refused_ = false;
};

// Where an accuracy is taken when no value is known yet.
double typical_value(const PointEntry& entry) {
  return entry.range ? ((*entry.range)[0] + (*entry.range)[1]) / 2.0 : 20.0;
}

}  // namespace

std::optional<PointSpec> point_spec(const PointEntry& entry, const Wiring& wiring,
                                    Problems& problems) {
  PointReader reader{entry, wiring, problems};
  PointSpec out = reader.read();
  return reader.refused() ? std::nullopt : std::optional{std::move(out)};
}

PairShare pair_share(const PointEntry& entry, const PointSpec& spec, const PlantFile& file,
                     Problems& problems) {
  std::vector<std::string> names;
  std::vector<const PointEntry*> members;
  for (const PointEntry& other : file.points) {
    if (other.pair && std::find(names.begin(), names.end(), *other.pair) == names.end()) {
      names.push_back(*other.pair);
    }
    if (other.pair == entry.pair) {
      members.push_back(&other);
    }
  }
  const auto refuse = [&entry, &problems](std::string allowed) {
    problems.push_back({.line = entry.line,
                        .key = "point \"" + entry.id + "\".pair",
                        .found = *entry.pair,
                        .allowed = std::move(allowed)});
  };
  const auto index =
      static_cast<std::size_t>(std::find(names.begin(), names.end(), *entry.pair) - names.begin());
  PairShare out{.pair = index, .variance = default_shared_variance};
  if (members.size() != 2 || members[0]->unit != members[1]->unit ||
      members[0]->machine != members[1]->machine) {
    refuse("a name that exactly two points of one machine and one unit share");
    return out;
  }
  const auto pair = std::find_if(file.pairs.begin(), file.pairs.end(),
                                 [&entry](const PairEntry& p) { return p.id == *entry.pair; });
  if (pair == file.pairs.end()) {
    return out;
  }
  Problems ignored;  // the other point's own problems are told where it stands
  const Wiring none;
  PointReader reader{entry, none, ignored};
  const PointEntry& other = *members[members[0] == &entry ? 1 : 0];
  const double u_own =
      standard_u_SI(spec.accuracies, spec.unit, typical_value(entry), quantum(spec));
  const double u_other = standard_u_SI(reader.accuracies(other.accuracy, spec.unit), spec.unit,
                                       typical_value(other), quantum(spec));
  const double u_difference =
      standard_u_SI(reader.accuracies(pair->difference, spec.unit), spec.unit, 0.0, 0.0);
  if (!(u_difference * u_difference <= u_own * u_own + u_other * u_other)) {
    refuse(
        "a difference at least as accurate as two sensors on their own; give the points their "
        "accuracy");
    return out;
  }
  if (u_own > 0.0 && u_other > 0.0) {  // var(a - b) = u_a^2 + u_b^2 - 2 share u_a u_b
    out.variance = std::min(1.0, (u_own * u_own + u_other * u_other - u_difference * u_difference) /
                                     (2.0 * u_own * u_other));
  }
  return out;
}

}  // namespace lostwork
