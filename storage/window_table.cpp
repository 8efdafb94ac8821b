#include "storage/window_table.h"

#include "storage/columns.h"
#include "storage/key.h"

#include <array>
#include <bit>
#include <cmath>
#include <optional>
#include <span>

namespace lostwork {
namespace {

constexpr std::uint8_t layout_version = 1;

using Column = std::vector<std::uint64_t>;

constexpr std::array fields{&WindowMean::mean_SI, &WindowMean::u_SI, &WindowMean::sd_SI,
                            &WindowMean::n_effective};

bool is_whole(const std::optional<WindowMean>& mean) {
  return mean && std::isfinite(mean->mean_SI) && std::isfinite(mean->u_SI) &&
         std::isfinite(mean->sd_SI) && std::isfinite(mean->n_effective);
}

void put_field(const Window& window, double WindowMean::*field, ColumnWriter& out) {
  Column column;
  for (const auto& mean : window.values) {
    if (is_whole(mean)) {
      column.push_back(std::bit_cast<std::uint64_t>((*mean).*field));
    }
  }
  out.put_column(column);
}

void encode(const Window& window, ColumnWriter& out) {
  out.put(layout_version);
  out.put(static_cast<std::uint8_t>(window.values.size()));
  Column column;
  for (const auto& mean : window.values) {
    column.push_back(is_whole(mean) ? 1 : 0);
  }
  out.put_column(column);
  for (const auto field : fields) {
    put_field(window, field, out);
  }
}

bool decode(ColumnReader in, Window& window) {
  if (in.get<std::uint8_t>() != layout_version) {
    return false;
  }
  const std::size_t quantities = in.get<std::uint8_t>();
  if (!in.ok() || quantities > window.values.size()) {
    return false;
  }
  Column there;
  in.get_column(quantities, there);
  std::vector<std::size_t> places;
  for (std::size_t i = 0; i < quantities; ++i) {
    if (there[i] != 0) {
      places.push_back(i);
      window.values.at(i) = WindowMean{};
    }
  }
  Column column;
  for (const auto field : fields) {
    in.get_column(places.size(), column);
    for (std::size_t i = 0; i < places.size(); ++i) {
      (*window.values.at(places[i])).*field = std::bit_cast<double>(column[i]);
    }
  }
  return in.ok();
}

}  // namespace

void write_window(Statement& insert, std::int64_t machine, const Window& window) {
  const std::int64_t key = key_of(machine, window.begin);
  ColumnWriter blob;
  encode(window, blob);
  insert.run(key, std::int64_t{window.end.time_since_epoch().count()}, window.scans,
             blob.sealed(key));
}

ReadWindows read_windows(Database& database, std::int64_t machine, Instant from, Instant to,
                         std::size_t limit) {
  ReadWindows out;
  if (from >= to) {
    return out;
  }
  Statement select{database,
                   "SELECT key, end_ms, scans, means FROM steady_window "
                   "WHERE key BETWEEN ?1 AND ?2 ORDER BY key LIMIT ?3"};
  Rows rows{select, key_of(machine, clamped(from)), key_of(machine, clamped(to - Span{1})),
            static_cast<std::int64_t>(limit)};
  while (rows.next()) {
    const std::int64_t key = rows.integer(0);
    Window window;
    window.begin = time_of(key);
    window.end = Instant{Span{rows.integer(1)}};
    window.scans = static_cast<std::uint32_t>(rows.integer(2));
    const auto in = ColumnReader::unsealed(key, rows.blob(3));
    if (in && decode(*in, window)) {
      out.windows.push_back(window);
    } else {
      ++out.damaged;
    }
  }
  return out;
}

}  // namespace lostwork
