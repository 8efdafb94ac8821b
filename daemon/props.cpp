#include "daemon/props.h"

#include "daemon/arguments.h"
#include "daemon/csv.h"
#include "daemon/props_points.h"
#include "thermo/fluids/fluid.h"

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <optional>
#include <string>
#include <utility>

namespace lostwork {
namespace {

constexpr std::array options{
    Option{     "--fluid", "NAME", "as --list names it, or water"                                  },
    Option{     "--given", "PAIR",
           "what is given: T,p T,x p,x p,h or p,s (degC, kPa absolute, kJ/kg, kJ/(kg K), vapour "
           "quality 0..1)"                                                                         },
    Option{     "--input", "FILE",
           "a CSV of points instead of the two values; its header names the two columns, for "
           "example T_degC,p_kPa"                                                                  },
    Option{     "--exact",     "", "the full equation of state; it is what every answer comes from"},
    Option{"--saturation",     "",   "a table of both saturation lines instead: FROM TO STEP, degC"},
    Option{      "--list",     "",          "the fluids: composition, safety class, limits, source"},
};

constexpr CommandLine command{
    .usage =
        "lostwork props --fluid NAME --given PAIR VALUE VALUE\n"
        "       lostwork props --fluid NAME --given PAIR --input FILE\n"
        "       lostwork props --fluid NAME --saturation FROM TO STEP\n"
        "       lostwork props --list",
    .purpose =
        "Properties of a fluid as CSV, one row a point. A point without an answer has an empty "
        "row\n"
        "with the reason in the last column; the exit code is then 1 for the values of a command\n"
        "line, 0 for a file. Refrigerants: h = 200 kJ/kg and s = 1 kJ/(kg K) for\n"
        "saturated liquid at 0 degC; water: u = s = 0 for saturated liquid at the triple point.\n"
        "The safety classes of --list are for orientation; the local code decides.",
    .options = options,
    .most_values = 3};

// Ten significant digits.
std::string digits(double value) {
  std::array<char, 32> text{};
  const auto [end, error] =
      std::to_chars(text.data(), text.data() + text.size(), value, std::chars_format::general, 10);
  return {text.data(), end};
}
std::string digits(const std::optional<double>& value) {
  return value ? digits(*value) : "";
}

double celsius(double T_K) {
  return T_K - 273.15;
}
double kelvin(double T_degC) {
  return T_degC + 273.15;
}
double kilo(double SI) {
  return SI / 1e3;
}

void write_row(std::ostream& out, const Fluid& fluid, const State& state) {
  std::optional<double> cp_kJ_kgK;  // NOLINT(readability-identifier-naming): the column's name
  std::optional<double> w_m_s;
  if (state.single) {
    cp_kJ_kgK = kilo(state.single->cp_JkgK);
    w_m_s = state.single->sound_speed_w;
  }
  out << fluid.name << ',' << name(state.phase) << ',' << digits(celsius(state.T_K)) << ','
      << digits(kilo(state.p_Pa)) << ',' << digits(state.rho_kgm3) << ','
      << digits(kilo(state.h_Jkg)) << ',' << digits(kilo(state.s_JkgK)) << ','
      << digits(state.quality) << ',' << digits(cp_kJ_kgK) << ',' << digits(w_m_s) << ",\n";
}

// "outside_fluid: temperature 300 degC: outside the range of the fluid's equation (-103.3 to ...)"
std::string sentence(const Fluid& fluid, const Reason& reason) {
  std::string found{reason.blame};
  std::string limits;
  if (reason.blame == "temperature") {
    found += ' ' + digits(celsius(reason.value_SI)) + " degC";
    limits = " (" + digits(celsius(fluid.min_T_K)) + " to " + digits(celsius(fluid.max_T_K)) +
             " degC; saturation below " + digits(celsius(fluid.critical_T_K)) + " degC)";
  } else if (reason.blame == "pressure") {
    found += ' ' + digits(kilo(reason.value_SI)) + " kPa";
    limits = " (up to " + digits(kilo(fluid.max_p_Pa)) + " kPa; saturation below " +
             digits(kilo(fluid.critical_p_Pa)) + " kPa)";
  } else if (reason.blame == "enthalpy") {
    found += ' ' + digits(kilo(reason.value_SI)) + " kJ/kg";
  } else if (reason.blame == "entropy") {
    found += ' ' + digits(kilo(reason.value_SI)) + " kJ/(kg K)";
  } else if (reason.blame == "quality") {
    found += ' ' + digits(reason.value_SI) + " (0 to 1)";
  }
  if (reason.code != ReasonCode::outside_fluid) {
    limits.clear();
  }
  return std::string{name(reason.code)} + ": " + found + ": " + std::string{text(reason.code)} +
         limits;
}

void write_answers(std::ostream& out, const Fluid& fluid, const GivenPair& pair,
                   std::span<const Point> points) {
  out << "fluid,phase,T_degC,p_kPa,rho_kg_m3,h_kJ_kg,s_kJ_kgK,x,cp_kJ_kgK,w_m_s,reason\n";
  for (const Point& point : points) {
    const Result<State> answer = pair.answer(fluid, point);
    if (answer) {
      write_row(out, fluid, *answer);
    } else {
      out << ",,,,,,,,,," << csv_field(sentence(fluid, answer.error())) << '\n';
    }
  }
}

void write_list(std::ostream& out) {
  out << "fluid,also,composition,safety_class,min_T_degC,max_T_degC,max_p_kPa,critical_T_degC,"
         "critical_p_kPa,reference_state,source\n";
  for (const Fluid* fluid : fluids()) {
    out << fluid->name << ',' << csv_field(fluid->second_name) << ','
        << csv_field(fluid->composition) << ',' << csv_field(fluid->safety_class) << ','
        << digits(celsius(fluid->min_T_K)) << ',' << digits(celsius(fluid->max_T_K)) << ','
        << digits(kilo(fluid->max_p_Pa)) << ',' << digits(celsius(fluid->critical_T_K)) << ','
        << digits(kilo(fluid->critical_p_Pa)) << ',' << csv_field(fluid->reference_state) << ','
        << csv_field(fluid->source) << '\n';
  }
}

// As many values as names; the error names the one that is no finite number.
template <std::size_t count>
tl::expected<std::array<double, count>, std::string> finite_values(
    const std::vector<std::string_view>& given, const std::array<std::string_view, count>& names) {
  std::array<double, count> out{};
  for (std::size_t i = 0; i < count; ++i) {
    const auto value = finite_number(given[i]);
    if (!value) {
      return tl::unexpected{std::string{names[i]} + " = \"" + std::string{given[i]} +
                            "\": allowed is a finite number"};
    }
    out[i] = *value;
  }
  return out;
}

struct SaturationRange {  // degC
  double from;
  double to;
  double step;
};

void write_saturation_row(std::ostream& out, const Fluid& fluid, double T_degC) {
  out << fluid.name << ',' << digits(T_degC);
  const Result<Saturation> at = saturation_at_T(fluid, kelvin(T_degC));
  if (!at) {
    out << ",,,,,,,,,," << csv_field(sentence(fluid, at.error())) << '\n';
    return;
  }
  const State& liquid = at->liquid;
  const State& vapour = at->vapour;
  for (const double value :
       {kilo(liquid.p_Pa), kilo(vapour.p_Pa), liquid.rho_kgm3, vapour.rho_kgm3, kilo(liquid.h_Jkg),
        kilo(vapour.h_Jkg), kilo(vapour.h_Jkg - liquid.h_Jkg), kilo(liquid.s_JkgK),
        kilo(vapour.s_JkgK)}) {
    out << ',' << digits(value);
  }
  out << ",\n";
}

void write_saturation(std::ostream& out, const Fluid& fluid, const SaturationRange& range) {
  out << "fluid,T_degC,p_bubble_kPa,p_dew_kPa,rho_liquid_kg_m3,rho_vapour_kg_m3,h_liquid_kJ_kg,"
         "h_vapour_kJ_kg,h_evaporation_kJ_kg,s_liquid_kJ_kgK,s_vapour_kJ_kgK,reason\n";
  const auto steps = static_cast<int>(std::floor((range.to - range.from) / range.step + 1e-9));
  for (int i = 0; i <= steps; ++i) {
    write_saturation_row(out, fluid, range.from + i * range.step);
  }
}

tl::expected<SaturationRange, std::string> saturation_range(const Arguments& arguments) {
  constexpr std::string_view form =
      "--saturation needs FROM TO STEP in degC, with TO not below FROM, STEP at least 0.001 and "
      "not more than 100000 rows";
  if (arguments.values.size() != 3) {
    return tl::unexpected{std::to_string(arguments.values.size()) + " values; " +
                          std::string{form}};
  }
  constexpr std::array<std::string_view, 3> names{"FROM", "TO", "STEP"};
  const auto given = finite_values(arguments.values, names);
  if (!given) {
    return tl::unexpected{given.error()};
  }
  const auto [from, to, step] = *given;
  constexpr double most_rows = 1e5;
  if (!(to >= from && step >= 1e-3 && (to - from) / step < most_rows)) {
    return tl::unexpected{digits(from) + ' ' + digits(to) + ' ' + digits(step) + ": " +
                          std::string{form}};
  }
  return SaturationRange{from, to, step};
}

struct Question {
  const Fluid* fluid;
  const GivenPair* pair;
  std::vector<Point> points;
};

std::string known_fluids() {
  std::string out;
  for (const Fluid* fluid : fluids()) {
    out.append(" ").append(fluid->name);
  }
  return out;
}

tl::expected<std::vector<Point>, std::string> points_of(const Arguments& arguments,
                                                        const GivenPair& pair) {
  const auto input = arguments.value("--input");
  if (input && !arguments.values.empty()) {
    return tl::unexpected{std::string{arguments.values[0]} +
                          ": not expected beside --input; allowed is one of the two"};
  }
  if (input) {
    return read_points(*input, pair);
  }
  if (arguments.values.size() != 2) {
    return tl::unexpected{std::to_string(arguments.values.size()) + " values; --given " +
                          std::string{pair.name} + " needs two values, or --input FILE"};
  }
  return finite_values(arguments.values, pair.columns).map([](const Point& point) {
    return std::vector{point};
  });
}

tl::unexpected<std::string> missing(std::string_view option) {
  return tl::unexpected{std::string{option} +
                        ": is required (or --list); see lostwork props --help"};
}

tl::expected<const Fluid*, std::string> fluid_of(const Arguments& arguments) {
  const auto name = arguments.value("--fluid");
  if (!name) {
    return missing("--fluid");
  }
  const Fluid* const fluid = fluid_named(*name);
  if (fluid == nullptr) {
    return tl::unexpected{"--fluid " + std::string{*name} +
                          ": no such fluid; known:" + known_fluids()};
  }
  return fluid;
}

tl::expected<Question, std::string> question_of(const Arguments& arguments, const Fluid& fluid) {
  const auto pair_name = arguments.value("--given");
  if (!pair_name) {
    return missing("--given");
  }
  const GivenPair* const pair = given_pair(*pair_name);
  if (pair == nullptr) {
    return tl::unexpected{"--given " + std::string{*pair_name} +
                          ": allowed is T,p T,x p,x p,h or p,s"};
  }
  return points_of(arguments, *pair).map([&](std::vector<Point> points) {
    return Question{&fluid, pair, std::move(points)};
  });
}

int answer_saturation(const Arguments& arguments, const Fluid& fluid, std::ostream& out,
                      std::ostream& err) {
  for (const std::string_view other : {"--given", "--input"}) {
    if (arguments.has(other)) {
      err << "lostwork props: " << other << ": not expected beside --saturation\n";
      return 2;
    }
  }
  const auto range = saturation_range(arguments);
  if (!range) {
    err << "lostwork props: " << range.error() << '\n';
    return 2;
  }
  write_saturation(out, fluid, *range);
  return 0;
}

}  // namespace

int props_command(std::span<const std::string_view> arguments, std::ostream& out,
                  std::ostream& err) {
  const auto parsed = begin_command(command, arguments, out, err);
  if (!parsed) {
    return parsed.error();
  }
  if (parsed->has("--list")) {
    write_list(out);
    return 0;
  }
  const auto fluid = fluid_of(*parsed);
  if (!fluid) {
    err << "lostwork props: " << fluid.error() << '\n';
    return 2;
  }
  if (parsed->has("--saturation")) {
    return answer_saturation(*parsed, **fluid, out, err);
  }
  const auto question = question_of(*parsed, **fluid);
  if (!question) {
    err << "lostwork props: " << question.error() << '\n';
    return 2;
  }
  write_answers(out, *question->fluid, *question->pair, question->points);
  if (parsed->has("--input")) {
    return 0;
  }
  const auto answer = question->pair->answer(*question->fluid, question->points.front());
  if (!answer) {
    err << "lostwork props: no answer for this point; "
        << sentence(*question->fluid, answer.error()) << '\n';
    return 1;
  }
  return 0;
}

}  // namespace lostwork
