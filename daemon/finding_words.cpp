#include "daemon/finding_words.h"

#include "daemon/figures.h"
#include "daemon/names.h"

#include <cmath>
#include <optional>

namespace lostwork {
namespace {

constexpr double percent = 100.0;
constexpr double joules_per_kWh = 3.6e6;
constexpr double to_kilo = 1e-3;

std::string onset_text(const OnsetInterval& onset, const WallClock& clock) {
  const auto day = [&clock](Instant time) { return day_text(time, clock.now, clock.offset); };
  std::string text = ", since " + day(onset.best);
  if (day(onset.earliest) != day(onset.latest)) {
    text += " (" + day(onset.earliest) + " to " + day(onset.latest) + ", 95 %)";
  }
  return text + '.';
}

std::string one_of_text(const Finding& finding, const MachineView& machine) {
  std::string text;
  for (const Role role : finding.suspect_sensors) {
    text += (text.empty() ? " At least one of these is most likely wrong: '" : "', '") +
            lostwork::text(role, machine);
  }
  return text.empty() ? text : text + "'.";
}

std::string drift_headline(const Finding& finding, const WallClock& clock) {
  const bool less = finding.size.value < 0.0;
  const Measured size = scaled(finding.size, less ? -percent : percent);
  return "Needs " + with_interval(size, "%") +
         (less ? " less power than it used to" : " more power than it should") + ", like for like" +
         onset_text(finding.onset, clock);
}

std::string place_sentence(const Finding& finding) {
  if (!finding.component) {
    return "It cannot be told which component loses it.";
  }
  const auto& change = finding.lost_change_W.at(static_cast<std::size_t>(*finding.component));
  std::string sentence = "The " + std::string{text(*finding.component)} + " loses ";
  if (change) {
    sentence += with_interval(scaled(*change, info(Quantity::power).per_SI), "kW") + " more, ";
  }
  return sentence + with_interval(scaled(finding.component_share, percent), "%") +
         " of the extra power. Part of that may be caused by another component.";
}

std::string cost_sentence(const Finding& finding) {
  std::string sentence =
      "So far it took " +
      with_interval(scaled(finding.extra_energy_J, 1.0 / joules_per_kWh), "kWh") + " more";
  if (finding.extra_cost) {
    sentence += ", which cost " + with_interval(*finding.extra_cost, finding.currency);
  }
  if (finding.extra_co2_kg) {
    sentence += " and released " + with_interval(*finding.extra_co2_kg, "kg") + " of CO2";
  }
  return sentence + '.';
}

// How far off a sensor reads.
struct Bias {
  Role role;
  Measured off_SI;                    // signed; of a flow in kg/s
  std::optional<double> present_kgs;  // of a flow
};

std::string size_text(const Bias& bias, const Measured& size_SI) {
  switch (dimension(bias.role)) {
    case Dimension::temperature: return with_interval(size_SI, "K");
    case Dimension::pressure: return with_interval(scaled(size_SI, to_kilo), "kPa");
    case Dimension::power: return with_interval(scaled(size_SI, to_kilo), "kW");
    case Dimension::flow:
      return bias.present_kgs ? with_interval(scaled(size_SI, percent / *bias.present_kgs), "%")
                              : with_interval(size_SI, "kg/s");
    default: return {};
  }
}

std::string sensor_text(const std::string& sensor, const Bias& bias) {
  const bool is_high = bias.off_SI.value > 0.0;
  const std::string size = size_text(bias, scaled(bias.off_SI, is_high ? 1.0 : -1.0));
  const std::string subject = "the sensor '" + sensor + "' ";
  if (size.empty() || bias.off_SI.value == 0.0 || !std::isfinite(bias.off_SI.value)) {
    return subject + "is wrong";
  }
  return subject + "reads " + size + (is_high ? " too high" : " too low");
}

std::optional<double> present_flow_kgs(Role role, const MachineView& machine) {
  if (role != Role::cold_flow && role != Role::hot_flow) {
    return std::nullopt;
  }
  const Result<Measured>& flow =
      machine.latest.values[role == Role::cold_flow ? Quantity::cold_flow : Quantity::hot_flow];
  return flow && flow->value > 0.0 ? std::optional{flow->value} : std::nullopt;
}

}  // namespace

std::string headline(const Finding& finding, const MachineView& machine, const WallClock& clock) {
  if (finding.kind == FindingKind::efficiency_drift) {
    return drift_headline(finding, clock);
  }
  if (finding.kind == FindingKind::law_broken) {
    return "The readings cannot all be true, for together they break the first or the second law "
           "of thermodynamics" +
           onset_text(finding.onset, clock) + one_of_text(finding, machine);
  }
  const std::string sensor =
      finding.suspect_sensors.empty()
          ? "A sensor"
          : "The sensor '" + text(finding.suspect_sensors.front(), machine) + "'";
  return sensor + " does not fit the others" + onset_text(finding.onset, clock);
}

std::vector<std::string> consequences(const Finding& finding) {
  std::vector<std::string> sentences;
  if (finding.kind == FindingKind::efficiency_drift) {
    sentences.push_back(place_sentence(finding));
    sentences.push_back(cost_sentence(finding));
    if (finding.compared_share < 1.0) {
      sentences.push_back("Only " + fixed(finding.compared_share * percent, 0) +
                          " % of the energy used since then could be compared.");
    }
  } else {
    sentences.emplace_back(
        "Until it is settled, figures that rest on a wrong sensor cannot be trusted.");
  }
  return sentences;
}

std::string text(FindingKind kind, const Evidence& evidence) {
  const QuantityInfo& q = info(evidence.quantity);
  const double difference = evidence.after_SI - evidence.before_SI;
  const Measured shown{.value = difference * q.per_SI, .u = evidence.u_SI * q.per_SI};
  const std::string_view unit = q.unit == "degC" ? "K" : q.unit;
  const int places = decimals(shown);
  const std::string_view short_unit = shown_unit(q.unit);
  const std::string tail = short_unit.empty() ? "" : ' ' + std::string{short_unit};
  const auto edge = [&q, places, &tail](double value_SI) {
    return fixed(value_SI * q.per_SI + q.offset, places) + tail;
  };
  const std::string found = std::string{q.meaning} + ": " + edge(evidence.after_SI) + " where ";
  if (kind == FindingKind::law_broken) {
    const std::string_view side = difference > 0.0 ? "at most " : "at least ";
    return found + "the law allows " + std::string{side} + edge(evidence.before_SI) +
           " (beyond it by " + with_interval({.value = std::abs(shown.value), .u = shown.u}, unit) +
           ')';
  }
  return found + edge(evidence.before_SI) + " was expected (difference " +
         with_interval(shown, unit) + ')';
}

std::string text(const RankedCause& cause, const MachineView& machine) {
  if (cause.cause != Cause::sensor || !cause.role) {
    return cause_text(cause);
  }
  return sensor_text(text(*cause.role, machine),
                     {.role = *cause.role,
                      .off_SI = cause.amount_SI,
                      .present_kgs = present_flow_kgs(*cause.role, machine)});
}

std::string cause_text(const RankedCause& cause) {
  if (cause.cause != Cause::sensor || !cause.role) {
    return std::string{text(cause.cause)};
  }
  return sensor_text(text(*cause.role),
                     {.role = *cause.role, .off_SI = cause.amount_SI, .present_kgs = std::nullopt});
}

std::vector<std::string> cautions(const Finding& finding) {
  std::vector<std::string> lines;
  if (finding.state == FindingState::watch) {
    lines.emplace_back("Not confirmed yet: it may still turn out to be nothing.");
  }
  if (finding.kind == FindingKind::efficiency_drift) {
    if (!finding.cause_is_clear) {
      lines.emplace_back("The causes below cannot yet be told apart with confidence.");
    }
    lines.emplace_back(
        "It is a comparison of the machine with itself, worked out from its sensors: check at the "
        "machine before money is spent.");
  }
  lines.emplace_back(
      "Work on the refrigerant circuit only by a licensed or certified person, and under the local "
      "code.");
  return lines;
}

}  // namespace lostwork
