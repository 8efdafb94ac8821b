#include "config/point_entry.h"

#include "config/toml_reader.h"

#include <algorithm>
#include <string>
#include <utility>

namespace lostwork {
namespace {

std::string sentinel_text(const std::variant<std::int64_t, double>& written) {
  return std::visit([](auto value) { return number_text(static_cast<double>(value)); }, written);
}

std::string all_roles() {
  std::string roles = "one of";
  for (std::size_t i = 0; i < static_cast<std::size_t>(Role::count); ++i) {
    roles += ' ' + std::string{name(static_cast<Role>(i))};
  }
  return roles;
}

// Of any role where the role itself is not known.
std::string units_for(std::optional<Role> role) {
  std::string units = role ? "for " + std::string{name(*role)} + " one of" : "one of";
  for (std::size_t i = 0; i < static_cast<std::size_t>(Unit::count); ++i) {
    if (!role || allowed(static_cast<Unit>(i), *role)) {
      units += ' ' + std::string{name(static_cast<Unit>(i))};
    }
  }
  return units;
}

class PointReader {
 public:
  PointReader(const PointEntry& entry, const PlantFile& file, const Wiring& wiring,
              Problems& problems)
      : entry_{entry}, file_{file}, wiring_{wiring}, problems_{problems} {}

  PointSpec read() {
    PointSpec out;
    out.id = entry_.id;
    out.machine = entry_.machine;
    out.circuit = static_cast<int>(entry_.circuit);
    check_words();
    out.role = role_named(entry_.role).value_or(Role::mode);
    if (const auto unit = unit_of(entry_)) {
      out.unit = *unit;
      out.accuracies = accuracies(entry_.accuracy, *unit, entry_.place, "accuracy", problems_);
    }
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

 private:
  void refuse(std::string_view key, std::string allowed, std::string found = {}) {
    lostwork::refuse(problems_, entry_.place, key, std::move(allowed), std::move(found));
  }

  void check_words() {
    const auto role = role_named(entry_.role);
    if (!role) {
      refuse("role", all_roles());
    }
    const auto unit = unit_named(entry_.unit);
    if (!unit || (role && !allowed(*unit, *role))) {
      refuse("unit", units_for(role));
    }
  }

  PointSource source() {
    if (entry_.value) {
      if (entry_.device || entry_.register_number) {
        refuse("value", "either a constant value or a register, not both");
      }
      return Constant{.value = *entry_.value};
    }
    if (!entry_.device) {
      if (entry_.register_number) {
        refuse("register", "needs device, the id of the device it is in");
      }
      return FileOnly{};
    }
    if (!entry_.register_number) {
      refuse("register", "is required with device: the number in its document");
    }
    return from_register();
  }

  PointSource from_register() {
    RegisterSpec spec;
    spec.table = table_named(entry_.table).value_or(Table::holding);
    spec.type =
        holds_bits(spec.table) ? RawType::bit : raw_type_named(entry_.type).value_or(RawType::u16);
    spec.order = byte_order_named(entry_.order).value_or(ByteOrder::abcd);
    spec.scale = entry_.scale;
    spec.offset = entry_.offset;
    if (entry_.place.sound("type") && entry_.place.sound("table")) {
      add_sentinels(spec);
    }
    const auto device =
        std::find_if(file_.devices.begin(), file_.devices.end(),
                     [this](const DeviceEntry& d) { return d.id == *entry_.device; });
    if (device == file_.devices.end()) {
      if (!may_mean(file_, "device", file_.devices)) {
        refuse("device", "the id of a device");
      }
    } else if (entry_.register_number && device->place.sound("addresses") &&
               entry_.place.sound("table")) {
      const auto at = static_cast<std::size_t>(device - file_.devices.begin());
      set_address(wiring_.devices[at].addresses, spec);
    }
    return FromRegister{.device = *entry_.device, .at = std::move(spec)};
  }

  void set_address(Notation notation, RegisterSpec& spec) {
    const auto address = wire_address(notation, spec.table, *entry_.register_number);
    if (!address) {
      refuse("register", address.error());
      return;
    }
    spec.address = *address;
    const auto fault = fault_of(spec);
    if (fault && entry_.place.sound("type")) {
      refuse(spec.scale == 0.0 ? "scale" : "register", *fault);
    }
  }

  void add_sentinels(RegisterSpec& spec) {
    for (const auto& written : entry_.sentinels) {
      const auto pattern =
          std::visit([&spec](auto value) { return bit_pattern(spec.type, value); }, written);
      if (pattern) {
        spec.sentinels.push_back(*pattern);
      } else {
        refuse("sentinels", "raw values that fit the type " + std::string{name(spec.type)},
               sentinel_text(written));
      }
    }
  }

  const PointEntry& entry_;
  const PlantFile& file_;
  const Wiring& wiring_;
  Problems& problems_;
};

}  // namespace

std::optional<Unit> unit_of(const PointEntry& entry) {
  const auto role = role_named(entry.role);
  const auto unit = unit_named(entry.unit);
  return role && unit && allowed(*unit, *role) ? unit : std::nullopt;
}

std::vector<Accuracy> accuracies(const std::vector<AccuracyEntry>& entries, Unit unit,
                                 const EntryPlace& place, std::string_view key,
                                 Problems& problems) {
  std::vector<Accuracy> out;
  for (const AccuracyEntry& entry : entries) {
    const auto pt100 = entry.sensor_class ? pt100_class_named(*entry.sensor_class) : std::nullopt;
    if (pt100) {
      out.emplace_back(*pt100);
    } else if (entry.sensor_class) {
      refuse(problems, place, std::string{key} + ".class",
             R"(one of "Pt100 AA", "Pt100 A", "Pt100 B", "Pt100 C")", *entry.sensor_class);
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
  if (std::any_of(out.begin(), out.end(),
                  [unit](const Accuracy& part) { return !allowed(part, unit); })) {
    refuse(problems, place, key,
           "a Pt100 class belongs to a temperature, not to " + std::string{name(unit)});
  }
  return out;
}

std::optional<PointSpec> point_spec(const PointEntry& entry, const PlantFile& file,
                                    const Wiring& wiring, Problems& problems) {
  const std::size_t before = problems.size();
  PointSpec out = PointReader{entry, file, wiring, problems}.read();
  const bool sound = entry.place.refused.empty() && problems.size() == before;
  return sound ? std::optional{std::move(out)} : std::nullopt;
}

}  // namespace lostwork
