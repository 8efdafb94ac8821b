#include "daemon/props_points.h"

#include "daemon/csv.h"

#include <algorithm>
#include <cerrno>
#include <charconv>
#include <cmath>
#include <fstream>
#include <system_error>

namespace lostwork {
namespace {

double kelvin(double celsius) {
  return celsius + 273.15;
}
double pascal(double kilopascal) {
  return 1e3 * kilopascal;
}
double per_kg(double kilojoule) {
  return 1e3 * kilojoule;
}

constexpr std::array pairs{
    GivenPair{"T,p",
              {"T_degC", "p_kPa"},
              [](const Fluid& fluid, const Point& point) {
 return state(fluid, GivenTp{kelvin(point[0]), pascal(point[1])});
 }},
    GivenPair{"T,x",
              {"T_degC", "x"},
              [](const Fluid& fluid, const Point& point) {
 return state(fluid, GivenTx{kelvin(point[0]), point[1]});
 }},
    GivenPair{"p,x",
              {"p_kPa", "x"},
              [](const Fluid& fluid, const Point& point) {
 return state(fluid, GivenPx{pascal(point[0]), point[1]});
 }},
    GivenPair{"p,h",
              {"p_kPa", "h_kJ_kg"},
              [](const Fluid& fluid, const Point& point) {
 return state(fluid, GivenPh{pascal(point[0]), per_kg(point[1])});
 }},
    GivenPair{"p,s",
              {"p_kPa", "s_kJ_kgK"},
              [](const Fluid& fluid, const Point& point) {
 return state(fluid, GivenPs{pascal(point[0]), per_kg(point[1])});
 }},
};

std::string at(const std::filesystem::path& file, std::size_t line) {
  return file.string() + ":" + std::to_string(line) + ": ";
}

using Places = std::array<std::size_t, 2>;  // where the two columns are

tl::expected<Places, std::string> read_header(const CsvReader& csv,
                                              const std::filesystem::path& file,
                                              const GivenPair& pair) {
  const std::span<const std::string_view> names = csv.fields();
  Places places{};
  for (std::size_t i = 0; i < places.size(); ++i) {
    const auto found = std::find(names.begin(), names.end(), pair.columns[i]);
    if (found == names.end()) {
      return tl::unexpected{at(file, csv.line()) + "column " + std::string{pair.columns[i]} +
                            ": missing from the header; for --given " + std::string{pair.name} +
                            " it must name " + std::string{pair.columns[0]} + " and " +
                            std::string{pair.columns[1]}};
    }
    if (std::find(found + 1, names.end(), pair.columns[i]) != names.end()) {
      return tl::unexpected{at(file, csv.line()) + "column " + std::string{pair.columns[i]} +
                            ": named twice; allowed is once"};
    }
    places[i] = static_cast<std::size_t>(found - names.begin());
  }
  return places;
}

tl::expected<Point, std::string> read_point(const CsvReader& csv, const std::string& place,
                                            const GivenPair& pair, const Places& places) {
  Point point{};
  for (std::size_t i = 0; i < point.size(); ++i) {
    const std::string_view cell = csv.fields()[places[i]];
    const auto value = finite_number(cell);
    if (!value) {
      return tl::unexpected{place + "column " + std::string{pair.columns[i]} + " = \"" +
                            std::string{cell} + "\": allowed is a finite number"};
    }
    point[i] = *value;
  }
  return point;
}

}  // namespace

std::span<const GivenPair> given_pairs() {
  return pairs;
}

const GivenPair* given_pair(std::string_view name) {
  const auto* const found = std::find_if(
      pairs.begin(), pairs.end(), [name](const GivenPair& pair) { return pair.name == name; });
  return found == pairs.end() ? nullptr : found;
}

std::optional<double> finite_number(std::string_view text) {
  if (text.starts_with('+') && !text.starts_with("+-")) {
    text.remove_prefix(1);
  }
  double value = 0.0;
  const char* const end = text.data() + text.size();
  const auto [rest, error] = std::from_chars(text.data(), end, value);
  return error == std::errc{} && rest == end && std::isfinite(value) ? std::optional{value}
                                                                     : std::nullopt;
}

tl::expected<std::vector<Point>, std::string> read_points(const std::filesystem::path& file,
                                                          const GivenPair& pair) {
  std::ifstream in{file};
  if (!in || std::filesystem::is_directory(file)) {
    return tl::unexpected{file.string() + ": cannot be read: " +
                          std::generic_category().message(in ? EISDIR : errno)};
  }
  CsvReader csv{in};
  if (!csv.next()) {
    return tl::unexpected{at(file, 1) + "empty; allowed is a header, then one row a point"};
  }
  const std::size_t width = csv.fields().size();
  const auto places = read_header(csv, file, pair);
  if (!places) {
    return tl::unexpected{places.error()};
  }
  std::vector<Point> points;
  while (csv.next()) {
    const std::string place = at(file, csv.line());
    if (csv.fields().size() != width) {
      return tl::unexpected{place + std::to_string(csv.fields().size()) + " columns; allowed are " +
                            std::to_string(width) + ", as in the header"};
    }
    const auto point = read_point(csv, place, pair, *places);
    if (!point) {
      return tl::unexpected{point.error()};
    }
    points.push_back(*point);
  }
  if (in.bad()) {
    return tl::unexpected{file.string() + ": could not be read to its end"};
  }
  return points;
}

}  // namespace lostwork
