#include "daemon/web/metrics.h"

#include "daemon/web/api_json.h"
#include "daemon/web/utf8.h"

#include <algorithm>
#include <array>
#include <charconv>
#include <chrono>
#include <initializer_list>
#include <utility>

namespace lostwork {
namespace {

using Seconds = std::chrono::duration<double>;
using Label = std::pair<std::string_view, std::string_view>;

std::string escaped(std::string_view value) {
  std::string text;
  for (const char c : valid_utf8(value)) {
    switch (c) {
      case '\\': text += "\\\\"; break;
      case '"': text += "\\\""; break;
      case '\n': text += "\\n"; break;
      default: text += c;
    }
  }
  return text;
}

class Exposition {
 public:
  // `unit` is empty, or the end of the name.
  void family(std::string_view name, std::string_view type, std::string_view unit,
              std::string_view help) {
    family_ = "lostwork_" + std::string{name};
    line("# TYPE ", family_, type);
    if (!unit.empty()) {
      line("# UNIT ", family_, unit);
    }
    line("# HELP ", family_, escaped(help));
  }
  void sample(std::string_view suffix, std::initializer_list<Label> labels, double value) {
    text_.append(family_).append(suffix).append("{");
    const char* separator = "";
    for (const auto& [label, content] : labels) {
      text_.append(separator).append(label).append("=\"").append(escaped(content)).append("\"");
      separator = ",";
    }
    std::array<char, 32> digits{};
    const auto [end, error] = std::to_chars(digits.data(), digits.data() + digits.size(), value);
    text_.append("} ").append(digits.data(), end).append("\n");
  }
  [[nodiscard]] std::string finished() { return std::move(text_) + "# EOF\n"; }

 private:
  void line(std::string_view mark, std::string_view name, std::string_view content) {
    text_.append(mark).append(name).append(" ").append(content).append("\n");
  }

  std::string text_;
  std::string family_;
};

// The unit as it stands at the end of the name ("W_K"); nothing for a ratio.
std::string_view unit_of(const QuantityInfo& q) {
  if (q.unit == "1") {
    return "";
  }
  const std::size_t length = q.unit == "%" ? std::string_view{"percent"}.size() : q.unit.size();
  return q.name.substr(q.name.size() - std::min(length, q.name.size()));
}

void sample_each(Exposition& out, const PlantView& view, Quantity quantity,
                 double Measured::*part) {
  for (const MachineView& machine : view.machines) {
    if (const auto value = current_values(machine, view.time)[quantity]) {
      const Measured shown = at_the_edge(quantity, *value);
      out.sample("",
                 {
                     {"machine", machine.id}
      },
                 shown.*part);
    }
  }
}

void quantity_families(Exposition& out, const PlantView& view, Quantity quantity) {
  const QuantityInfo& q = info(quantity);
  out.family(q.name, "gauge", unit_of(q), q.meaning);
  sample_each(out, view, quantity, &Measured::value);
  out.family("u_" + std::string{q.name}, "gauge", unit_of(q),
             "standard uncertainty of " + std::string{q.name});
  sample_each(out, view, quantity, &Measured::u);
}

void sample_missing(Exposition& out, std::string_view machine, const QuantityValues& values) {
  for (const QuantityInfo& q : quantities()) {
    const auto& value = values[*quantity_named(q.name)];
    if (!value) {
      out.sample(
          "",
          {
              { "machine",                  machine},
              {"quantity",                   q.name},
              {  "reason", name(value.error().code)}
      },
          1.0);
    }
  }
}

void missing_family(Exposition& out, const PlantView& view) {
  out.family("missing", "gauge", "", "1 for each quantity without a value");
  for (const MachineView& machine : view.machines) {
    sample_missing(out, machine.id, current_values(machine, view.time));
  }
}

void state_families(Exposition& out, const PlantView& view) {
  out.family("machine_read", "gauge", "", "1 where the machine is read, 0 where it is not");
  for (const MachineView& machine : view.machines) {
    out.sample("",
               {
                   {"machine", machine.id}
    },
               is_read(machine, view.time) ? 1.0 : 0.0);
  }
  out.family("last_read_seconds", "gauge", "seconds", "time since the machine was last read");
  for (const MachineView& machine : view.machines) {
    if (machine.last_read) {
      out.sample("",
                 {
                     {"machine", machine.id}
      },
                 Seconds{view.time - *machine.last_read}.count());
    }
  }
  out.family("mode", "stateset", "", "what the machine does");
  for (const MachineView& machine : view.machines) {
    const Mode now = is_read(machine, view.time) ? machine.latest.mode : Mode::unknown;
    for (std::size_t i = 0; i < static_cast<std::size_t>(Mode::count); ++i) {
      const auto mode = static_cast<Mode>(i);
      out.sample("",
                 {
                     {      "machine", machine.id},
                     {"lostwork_mode", name(mode)}
      },
                 mode == now ? 1.0 : 0.0);
    }
  }
  out.family("level", "gauge", "", "what the sensors allow, 0 to 5");
  for (const MachineView& machine : view.machines) {
    out.sample("",
               {
                   {"machine", machine.id}
    },
               static_cast<double>(machine.latest.level));
  }
}

void counter_families(Exposition& out, const PlantView& view) {
  out.family("run_time_seconds", "counter", "seconds", "time that the machine ran");
  for (const MachineView& machine : view.machines) {
    if (machine.run_time) {
      out.sample("_total",
                 {
                     {"machine", machine.id}
      },
                 Seconds{*machine.run_time}.count());
    }
  }
  out.family("starts", "counter", "", "how often the machine started");
  for (const MachineView& machine : view.machines) {
    if (machine.starts) {
      out.sample("_total",
                 {
                     {"machine", machine.id}
      },
                 static_cast<double>(*machine.starts));
    }
  }
}

void health_families(Exposition& out, const PlantView& view) {
  out.family("point_good", "gauge", "", "1 where the point's last reading is good");
  for (const MachineView& machine : view.machines) {
    for (const PointView& point : machine.points) {
      out.sample("",
                 {
                     {"machine", machine.id},
                     {  "point",   point.id}
      },
                 point.reading.quality == Quality::good ? 1.0 : 0.0);
    }
  }
  out.family("findings", "gauge", "", "findings that are not over");
  for (const MachineView& machine : view.machines) {
    out.sample("",
               {
                   {"machine", machine.id}
    },
               static_cast<double>(machine.findings.size()));
  }
  out.family("alarm", "gauge", "", "1 for each alarm that is not normal");
  for (const AlarmView& alarm : view.alarms) {
    out.sample("",
               {
                   {"machine",           alarm.machine},
                   {  "alarm",          alarm.alarm.id},
                   {   "kind",  name(alarm.alarm.kind)},
                   {  "state", name(alarm.alarm.state)}
    },
               1.0);
  }
}

}  // namespace

std::string metrics_text(const PlantView& view) {
  Exposition out;
  state_families(out, view);
  counter_families(out, view);
  health_families(out, view);
  for (std::size_t i = 0; i < quantity_count; ++i) {
    quantity_families(out, view, static_cast<Quantity>(i));
  }
  missing_family(out, view);
  return out.finished();
}

}  // namespace lostwork
