#include "storage/sample_block.h"

#include "storage/key.h"

#include <bit>
#include <cmath>

namespace lostwork {
namespace {

constexpr std::uint8_t layout_version = 1;

using Column = std::vector<std::uint64_t>;

std::uint64_t finite_bits(double value) {
  return std::bit_cast<std::uint64_t>(std::isfinite(value) ? value : 0.0);
}

// Differences and sums of times wrap around instead of overflowing, whatever a blob says.
std::int64_t difference(Instant later, Instant earlier) {
  return static_cast<std::int64_t>(static_cast<std::uint64_t>(later.time_since_epoch().count()) -
                                   static_cast<std::uint64_t>(earlier.time_since_epoch().count()));
}
Instant moved(Instant time, std::uint64_t by_ms) {
  return Instant{Span{static_cast<std::int64_t>(
      static_cast<std::uint64_t>(time.time_since_epoch().count()) + by_ms)}};
}

std::uint64_t stored_quality(const Reading& reading) {
  const bool finite = std::isfinite(reading.value_SI) && std::isfinite(reading.u_SI);
  const Quality quality =
      reading.quality == Quality::good && !finite ? Quality::out_of_range : reading.quality;
  return static_cast<std::uint64_t>(quality);
}

// One column of a point: what `number` makes of its readings.
template <class Number>
void put_point(std::span<const Scan* const> scans, std::size_t point, ColumnWriter& out,
               Column& column, Number number) {
  for (std::size_t i = 0; i < scans.size(); ++i) {
    column[i] = number(scans[i]->readings[point], *scans[i]);
  }
  out.put_column(column, true);
}

struct Header {
  std::size_t scans = 0;
  std::size_t points = 0;
  std::uint32_t layout = 0;
};

std::optional<Header> get_header(ColumnReader& in) {
  if (in.get<std::uint8_t>() != layout_version) {
    return std::nullopt;
  }
  Header out;
  out.scans = in.get<std::uint16_t>();
  out.points = in.get<std::uint16_t>();
  out.layout = in.get<std::uint32_t>();
  const bool sound =
      in.ok() && out.scans > 0 && out.scans <= most_scans_a_block && out.points <= most_points;
  return sound ? std::optional{out} : std::nullopt;
}

std::vector<Instant> get_times(ColumnReader& in, std::size_t scans, Instant first) {
  Column steps;
  in.get_column(scans - 1, steps);
  std::vector<Instant> out{first};
  for (const std::uint64_t step : steps) {
    out.push_back(moved(out.back(), step));
  }
  return out;
}

// False: a quality that is not known.
bool get_point(ColumnReader& in, std::size_t point, std::vector<Scan>& scans) {
  Column qualities;
  Column values;
  Column uncertainties;
  Column delays;
  in.get_column(scans.size(), qualities);
  in.get_column(scans.size(), values);
  in.get_column(scans.size(), uncertainties);
  in.get_column(scans.size(), delays);
  for (std::size_t i = 0; i < scans.size(); ++i) {
    if (qualities[i] >= static_cast<std::uint64_t>(Quality::count)) {
      return false;
    }
    scans[i].readings[point] = {
        .value_SI = std::bit_cast<double>(values[i]),
        .u_SI = std::bit_cast<double>(uncertainties[i]),
        .quality = static_cast<Quality>(qualities[i]),
        .time = moved(scans[i].time, static_cast<std::uint64_t>(unzigzag(delays[i]))),
    };
  }
  return in.ok();
}

}  // namespace

void encode_samples(std::span<const Scan* const> scans, std::uint32_t layout, std::size_t points,
                    ColumnWriter& out) {
  out.put(layout_version);
  out.put(static_cast<std::uint16_t>(scans.size()));
  out.put(static_cast<std::uint16_t>(points));
  out.put(layout);
  Column column;
  for (std::size_t i = 1; i < scans.size(); ++i) {
    column.push_back(static_cast<std::uint64_t>(difference(scans[i]->time, scans[i - 1]->time)));
  }
  out.put_column(column, true);
  column.resize(scans.size());
  for (std::size_t point = 0; point < points; ++point) {
    put_point(scans, point, out, column,
              [](const Reading& r, const Scan&) { return stored_quality(r); });
    put_point(scans, point, out, column,
              [](const Reading& r, const Scan&) { return finite_bits(r.value_SI); });
    put_point(scans, point, out, column,
              [](const Reading& r, const Scan&) { return finite_bits(r.u_SI); });
    put_point(scans, point, out, column, [](const Reading& r, const Scan& scan) {
      return zigzag(difference(r.time, scan.time));
    });
  }
}

std::optional<SampleBlock> decode_samples(std::int64_t key, std::span<const std::uint8_t> blob) {
  std::optional<ColumnReader> in = ColumnReader::unsealed(key, blob);
  const std::optional<Header> header = in ? get_header(*in) : std::nullopt;
  if (!header) {
    return std::nullopt;
  }
  SampleBlock out{.layout = header->layout, .scans = {}};
  for (const Instant time : get_times(*in, header->scans, time_of(key))) {
    out.scans.push_back({.time = time, .readings = std::vector<Reading>(header->points)});
  }
  for (std::size_t point = 0; point < header->points; ++point) {
    if (!get_point(*in, point, out.scans)) {
      return std::nullopt;
    }
  }
  return in->ok() ? std::optional{std::move(out)} : std::nullopt;
}

std::optional<std::vector<Instant>> decode_sample_times(std::int64_t key,
                                                        std::span<const std::uint8_t> blob) {
  std::optional<ColumnReader> in = ColumnReader::unsealed(key, blob);
  const std::optional<Header> header = in ? get_header(*in) : std::nullopt;
  if (!header) {
    return std::nullopt;
  }
  std::vector<Instant> out = get_times(*in, header->scans, time_of(key));
  return in->ok() ? std::optional{std::move(out)} : std::nullopt;
}

}  // namespace lostwork
