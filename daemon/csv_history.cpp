#include "daemon/csv_history.h"

#include "daemon/local_time.h"

#include <algorithm>
#include <cerrno>
#include <charconv>
#include <system_error>
#include <variant>

namespace lostwork {

CsvHistory::CsvHistory(std::filesystem::path file, const Wiring& wiring)
    : file_{std::move(file)},
      wiring_{&wiring},
      in_{std::make_unique<std::ifstream>(file_)},
      reader_{*in_} {}

tl::expected<CsvHistory, std::string> CsvHistory::open(const std::filesystem::path& file,
                                                       const Wiring& wiring) {
  CsvHistory out{file, wiring};
  if (!*out.in_) {
    return tl::unexpected{file.string() +
                          ": cannot be read: " + std::generic_category().message(errno)};
  }
  if (auto error = out.read_header()) {
    return tl::unexpected{std::move(*error)};
  }
  return out;
}

std::string CsvHistory::place(std::size_t column) const {
  std::string out = file_.string() + ':' + std::to_string(reader_.line());
  if (column < header_.size()) {
    out += ": column " + header_[column];
  }
  return out + ": ";
}

std::optional<std::string> CsvHistory::read_header() {
  if (!reader_.next() || reader_.fields()[0] != "time") {
    return file_.string() + ":1: the first column of the header must be time";
  }
  for (const std::string_view field : reader_.fields()) {
    if (std::find(header_.begin(), header_.end(), field) != header_.end()) {
      return place(header_.size()) + std::string{field} + " stands twice in the header";
    }
    header_.emplace_back(field);
  }
  const auto& points = wiring_->points;
  for (std::size_t column = 1; column < header_.size(); ++column) {
    const auto point =
        std::find_if(points.begin(), points.end(),
                     [this, column](const PointSpec& p) { return p.id == header_[column]; });
    if (point == points.end()) {
      return place(column) + "the plant file has no such point";
    }
    if (std::holds_alternative<Constant>(point->source)) {
      return place(column) + "the plant file gives this point a constant value";
    }
    point_of_column_.push_back(static_cast<std::size_t>(point - points.begin()));
  }
  for (std::size_t i = 0; i < points.size(); ++i) {
    if (!std::holds_alternative<Constant>(points[i].source) &&
        std::find(point_of_column_.begin(), point_of_column_.end(), i) == point_of_column_.end()) {
      return file_.string() + ":1: column " + points[i].id +
             " is missing; leave its fields empty where it was not read";
    }
  }
  return std::nullopt;
}

tl::expected<std::optional<HistoryRow>, std::string> CsvHistory::next() {
  if (!reader_.next()) {
    return std::nullopt;
  }
  const auto fields = reader_.fields();
  if (fields.size() != header_.size()) {
    return tl::unexpected{place(header_.size()) + std::to_string(fields.size()) +
                          " fields; allowed are " + std::to_string(header_.size()) +
                          ", as in the header"};
  }
  const auto time = instant_of(fields[0]);
  if (!time) {
    return tl::unexpected{
        place(0) + '"' + std::string{fields[0]} +
        "\" is no time; allowed is ISO 8601 with Z or an offset, as 2026-03-01T06:30:00Z"};
  }
  if (last_ && *time <= *last_) {
    return tl::unexpected{place(0) + '"' + std::string{fields[0]} +
                          "\" is not later than the row before"};
  }
  last_ = time;
  HistoryRow row{.time = *time,
                 .values = std::vector<std::optional<double>>(wiring_->points.size())};
  for (std::size_t column = 1; column < fields.size(); ++column) {
    const std::string_view field = fields[column];
    if (field.empty()) {
      continue;
    }
    double value = 0.0;
    const auto [end, error] = std::from_chars(field.data(), field.data() + field.size(), value);
    if (error != std::errc{} || end != field.data() + field.size()) {
      return tl::unexpected{
          place(column) + '"' + std::string{field} +
          "\" is no number; allowed is a number, or nothing where it was not read"};
    }
    row.values[point_of_column_[column - 1]] = value;
  }
  return row;
}

}  // namespace lostwork
