#include "storage/sums_block.h"

#include "storage/key.h"

#include <algorithm>
#include <array>
#include <bit>
#include <cmath>
#include <utility>

namespace lostwork {
namespace {

constexpr std::uint8_t layout_version = 1;

using Column = std::vector<std::uint64_t>;

enum Presence : std::uint8_t { in_none = 0, in_all = 1, in_some = 2 };

bool is_ratio(std::size_t quantity) {
  return weight_of(static_cast<Quantity>(quantity)).has_value();
}

std::uint64_t bits(double value) {
  return std::bit_cast<std::uint64_t>(value);
}
std::uint64_t float_bits(double value) {
  return std::bit_cast<std::uint32_t>(static_cast<float>(value));
}
double number(std::uint64_t bits) {
  return std::bit_cast<double>(bits);
}
double float_number(std::uint64_t bits) {
  return static_cast<double>(std::bit_cast<float>(static_cast<std::uint32_t>(bits)));
}

// ---- writing

class Encoder {
 public:
  Encoder(std::span<const Period> periods, Words& words, ColumnWriter& out)
      : periods_{periods}, words_{words}, out_{out} {
    single_ = std::all_of(periods.begin(), periods.end(),
                          [](const Period& p) { return p.sums.scans == 1; });
  }

  void header(Span length) {
    out_.put(layout_version);
    out_.put(static_cast<std::uint8_t>(single_ ? 1 : 0));
    out_.put(static_cast<std::uint16_t>(periods_.size()));
    out_.put(static_cast<std::uint8_t>(quantity_count));
    Instant before = periods_.front().begin;
    column([&before, length](const Period& p) {
      const auto steps = (p.begin - std::exchange(before, p.begin)) / length;
      return static_cast<std::uint64_t>(steps);
    });
    column([](const Period& p) {
      return static_cast<std::uint64_t>((p.sums.newest - p.begin).count());
    });
    column([](const Period& p) { return static_cast<std::uint64_t>(p.sums.mode); });
    column([](const Period& p) { return static_cast<std::uint64_t>(p.sums.level); });
    column([](const Period& p) { return p.sums.covered_ms; });
    column([](const Period& p) { return std::uint64_t{p.sums.steady_scans}; });
    if (!single_) {
      column([](const Period& p) { return std::uint64_t{p.sums.scans}; });
    }
  }

  void quantity(std::size_t place) {
    present_.clear();
    missing_.clear();
    column_.clear();
    for (const Period& period : periods_) {
      const QuantitySums& sums = period.sums.quantities[place];
      (sums.count > 0 ? present_ : missing_).push_back(&sums);
      column_.push_back(sums.count > 0 ? 1 : 0);
    }
    if (missing_.empty()) {
      out_.put(std::uint8_t{in_all});
    } else if (present_.empty()) {
      out_.put(std::uint8_t{in_none});
    } else {
      out_.put(std::uint8_t{in_some});
      out_.put_column(column_);
    }
    if (!present_.empty()) {
      values(is_ratio(place));
    }
    if (!missing_.empty()) {
      reasons();
    }
  }

 private:
  template <class Number>
  void column(Number number) {
    column_.clear();
    for (const Period& period : periods_) {
      column_.push_back(number(period));
    }
    out_.put_column(column_);
  }
  template <class Number>
  void column(const std::vector<const QuantitySums*>& sums, Number number) {
    column_.clear();
    for (const QuantitySums* one : sums) {
      column_.push_back(number(*one));
    }
    out_.put_column(column_);
  }
  void values(bool ratio) {
    if (single_) {
      column(present_, [](const QuantitySums& s) { return bits(s.min); });
      column(present_, [](const QuantitySums& s) { return float_bits(s.u_sum / s.weight); });
      return;
    }
    column(present_, [](const QuantitySums& s) { return bits(s.sum); });
    column(present_, [](const QuantitySums& s) { return bits(s.u_sum); });
    column(present_, [](const QuantitySums& s) { return bits(s.min); });
    column(present_, [](const QuantitySums& s) { return bits(s.max); });
    column(present_, [](const QuantitySums& s) { return std::uint64_t{s.count}; });
    if (ratio) {
      column(present_, [](const QuantitySums& s) { return bits(s.weight); });
    }
  }
  void reasons() {
    column(missing_,
           [](const QuantitySums& s) { return static_cast<std::uint64_t>(s.reason.code); });
    column(missing_,
           [this](const QuantitySums& s) { return std::uint64_t{words_.number(s.reason.blame)}; });
    column(missing_, [](const QuantitySums& s) {
      return std::isfinite(s.reason.value_SI) ? std::uint64_t{1} : std::uint64_t{0};
    });
    column(missing_, [](const QuantitySums& s) {
      return std::isfinite(s.reason.value_SI) ? bits(s.reason.value_SI) : 0;
    });
  }

  std::span<const Period> periods_;
  Words& words_;
  ColumnWriter& out_;
  bool single_ = false;
  std::vector<const QuantitySums*> present_;
  std::vector<const QuantitySums*> missing_;
  Column column_;
};

// ---- reading

struct Row {
  Instant begin{};
  std::int64_t newest_ms = 0;
  std::uint64_t mode = 0;
  std::uint64_t level = 0;
  std::uint64_t covered_ms = 0;
  std::uint32_t steady_scans = 0;
  std::uint32_t scans = 1;
};

class Decoder {
 public:
  Decoder(ColumnReader in, Words* words) : in_{in}, words_{words} {}

  [[nodiscard]] bool header(Instant first, Span length) {
    if (in_.get<std::uint8_t>() != layout_version) {
      return false;
    }
    single_ = in_.get<std::uint8_t>() == 1;
    rows_.resize(in_.get<std::uint16_t>());
    quantities_ = in_.get<std::uint8_t>();
    if (!in_.ok() || rows_.empty() || rows_.size() > most_periods_a_block) {
      return false;
    }
    auto begin = static_cast<std::uint64_t>(first.time_since_epoch().count());
    const auto step = static_cast<std::uint64_t>(length.count());
    column([&begin, step](Row& row, std::uint64_t steps) {
      begin += steps * step;
      row.begin = Instant{Span{static_cast<std::int64_t>(begin)}};
    });
    return in_.ok() && std::all_of(rows_.begin(), rows_.end(),
                                   [](const Row& row) { return storable(row.begin); });
  }

  [[nodiscard]] bool rest_of_header() {
    constexpr auto low = [](std::uint64_t value) { return static_cast<std::uint32_t>(value); };
    column([low](Row& row, std::uint64_t value) { row.newest_ms = low(value); });
    column([](Row& row, std::uint64_t value) { row.mode = value; });
    column([](Row& row, std::uint64_t value) { row.level = value; });
    column([](Row& row, std::uint64_t value) { row.covered_ms = value; });
    column([low](Row& row, std::uint64_t value) { row.steady_scans = low(value); });
    if (!single_) {
      column([low](Row& row, std::uint64_t value) { row.scans = low(value); });
    }
    return in_.ok() && std::all_of(rows_.begin(), rows_.end(), [](const Row& row) {
             return row.mode < static_cast<std::uint64_t>(Mode::count) &&
                    row.level < static_cast<std::uint64_t>(Level::count) && row.scans > 0;
           });
  }

  [[nodiscard]] const std::vector<Row>& rows() const { return rows_; }
  [[nodiscard]] std::size_t quantities() const { return quantities_; }
  [[nodiscard]] bool single() const { return single_; }

  // The sums of the next quantity; weights of ratios in a single block are still to be made.
  [[nodiscard]] bool quantity(bool ratio, std::vector<QuantitySums>& out) {
    out.assign(rows_.size(), QuantitySums{});
    split();
    if (!present_.empty()) {
      values(ratio, out);
    }
    if (!missing_.empty() && !reasons(out)) {
      return false;
    }
    return in_.ok();
  }

  [[nodiscard]] bool skip_quantity(bool ratio) {
    split();
    const std::size_t columns = single_ ? 2 : ratio ? 6 : 5;
    for (std::size_t i = 0; i < columns && !present_.empty(); ++i) {
      in_.skip_column(present_.size());
    }
    for (std::size_t i = 0; i < 4 && !missing_.empty(); ++i) {
      in_.skip_column(missing_.size());
    }
    return in_.ok();
  }

 private:
  template <class Take>
  void column(Take take) {
    in_.get_column(rows_.size(), column_);
    for (std::size_t i = 0; i < rows_.size(); ++i) {
      take(rows_[i], column_[i]);
    }
  }
  template <class Take>
  void column(const std::vector<std::size_t>& places, std::vector<QuantitySums>& out, Take take) {
    in_.get_column(places.size(), column_);
    for (std::size_t i = 0; i < places.size(); ++i) {
      take(out[places[i]], column_[i]);
    }
  }

  // Which of the periods have a value for the next quantity.
  void split() {
    const auto presence = in_.get<std::uint8_t>();
    column_.assign(rows_.size(), presence == in_all ? 1 : 0);
    if (presence == in_some) {
      in_.get_column(rows_.size(), column_);
    }
    present_.clear();
    missing_.clear();
    for (std::size_t i = 0; i < rows_.size(); ++i) {
      (column_[i] != 0 ? present_ : missing_).push_back(i);
    }
  }

  void values(bool ratio, std::vector<QuantitySums>& out) {
    if (single_) {
      column(present_, out, [](QuantitySums& s, std::uint64_t value) {
        s = {.sum = number(value), .min = number(value), .max = number(value)};
        s.weight = 1.0;
        s.count = 1;
      });
      column(present_, out,
             [](QuantitySums& s, std::uint64_t value) { s.u_sum = float_number(value); });
      return;
    }
    column(present_, out, [](QuantitySums& s, std::uint64_t value) { s.sum = number(value); });
    column(present_, out, [](QuantitySums& s, std::uint64_t value) { s.u_sum = number(value); });
    column(present_, out, [](QuantitySums& s, std::uint64_t value) { s.min = number(value); });
    column(present_, out, [](QuantitySums& s, std::uint64_t value) { s.max = number(value); });
    column(present_, out, [](QuantitySums& s, std::uint64_t value) {
      s.count = static_cast<std::uint32_t>(value);
      s.weight = static_cast<double>(s.count);
    });
    if (ratio) {
      column(present_, out, [](QuantitySums& s, std::uint64_t value) { s.weight = number(value); });
    }
  }

  // False: a code that is not known.
  [[nodiscard]] bool reasons(std::vector<QuantitySums>& out) {
    bool known = true;
    column(missing_, out, [&known](QuantitySums& s, std::uint64_t value) {
      known = known && value < static_cast<std::uint64_t>(ReasonCode::count);
      s.reason.code = static_cast<ReasonCode>(value);
    });
    column(missing_, out, [words = words_](QuantitySums& s, std::uint64_t value) {
      s.reason.blame = words->text(static_cast<std::uint16_t>(value));
    });
    in_.get_column(missing_.size(), has_figure_);
    in_.get_column(missing_.size(), column_);
    for (std::size_t i = 0; i < missing_.size(); ++i) {
      if (has_figure_[i] != 0) {
        out[missing_[i]].reason.value_SI = number(column_[i]);
      }
    }
    return known;
  }

  ColumnReader in_;
  Words* words_;
  bool single_ = false;
  std::size_t quantities_ = 0;
  std::vector<Row> rows_;
  Column column_;
  Column has_figure_;
  std::vector<std::size_t> present_;
  std::vector<std::size_t> missing_;
};

// What sums.cpp had added for one scan with that denominator.
void weigh(QuantitySums& ratio, const QuantitySums& denominator) {
  if (ratio.count == 1 && denominator.count == 1 && denominator.min > 0.0) {
    ratio.weight = denominator.min;
    ratio.sum *= ratio.weight;
    ratio.u_sum *= ratio.weight;
  }
}

PeriodSums sums_of(const Row& row) {
  PeriodSums out;
  out.scans = row.scans;
  out.steady_scans = row.steady_scans;
  out.covered_ms = row.covered_ms;
  out.newest = row.begin + Span{row.newest_ms};
  out.mode = static_cast<Mode>(row.mode);
  out.level = static_cast<Level>(row.level);
  return out;
}

}  // namespace

void encode_sums(std::span<const Period> periods, Span length, Words& words, ColumnWriter& out) {
  Encoder encoder{periods, words, out};
  encoder.header(length);
  for (std::size_t place = 0; place < quantity_count; ++place) {
    encoder.quantity(place);
  }
}

std::optional<std::vector<Period>> decode_sums(std::int64_t key, Span length,
                                               std::span<const std::uint8_t> blob, Words& words) {
  const std::optional<ColumnReader> in = ColumnReader::unsealed(key, blob);
  if (!in) {
    return std::nullopt;
  }
  Decoder decoder{*in, &words};
  // A later program's quantities are not known here: its tables are of a later version.
  if (!decoder.header(time_of(key), length) || !decoder.rest_of_header() ||
      decoder.quantities() > quantity_count) {
    return std::nullopt;
  }
  std::vector<Period> out;
  for (const Row& row : decoder.rows()) {
    out.push_back({.begin = row.begin, .sums = sums_of(row)});
  }
  std::vector<QuantitySums> sums;
  for (std::size_t place = 0; place < decoder.quantities(); ++place) {
    if (!decoder.quantity(is_ratio(place), sums)) {
      return std::nullopt;
    }
    for (std::size_t i = 0; i < out.size(); ++i) {
      out[i].sums.quantities.at(place) = sums[i];
    }
  }
  for (std::size_t place = 0; decoder.single() && place < quantity_count; ++place) {
    const std::optional<Quantity> weight = weight_of(static_cast<Quantity>(place));
    for (std::size_t i = 0; weight && i < out.size(); ++i) {
      weigh(out[i].sums.quantities.at(place), out[i].sums[*weight]);
    }
  }
  return out;
}

std::optional<std::vector<Instant>> decode_sums_begins(std::int64_t key, Span length,
                                                       std::span<const std::uint8_t> blob) {
  const std::optional<ColumnReader> in = ColumnReader::unsealed(key, blob);
  if (!in) {
    return std::nullopt;
  }
  Decoder decoder{*in, nullptr};
  if (!decoder.header(time_of(key), length)) {
    return std::nullopt;
  }
  std::vector<Instant> out;
  for (const Row& row : decoder.rows()) {
    out.push_back(row.begin);
  }
  return out;
}

std::optional<std::vector<QuantityPeriod>> decode_sums_of(std::int64_t key, Span length,
                                                          std::span<const std::uint8_t> blob,
                                                          Quantity quantity, Words& words) {
  const std::optional<ColumnReader> in = ColumnReader::unsealed(key, blob);
  if (!in) {
    return std::nullopt;
  }
  Decoder decoder{*in, &words};
  if (!decoder.header(time_of(key), length) || !decoder.rest_of_header()) {
    return std::nullopt;
  }
  const auto wanted = static_cast<std::size_t>(quantity);
  const std::optional<Quantity> weight = weight_of(quantity);
  const std::size_t weight_place = weight ? static_cast<std::size_t>(*weight) : wanted;
  std::vector<QuantitySums> sums(decoder.rows().size());
  std::vector<QuantitySums> weights;
  const std::size_t end = std::min(std::max(wanted, weight_place) + 1, decoder.quantities());
  for (std::size_t place = 0; place < end; ++place) {
    const bool read = place == wanted         ? decoder.quantity(is_ratio(place), sums)
                      : place == weight_place ? decoder.quantity(is_ratio(place), weights)
                                              : decoder.skip_quantity(is_ratio(place));
    if (!read) {
      return std::nullopt;
    }
  }
  std::vector<QuantityPeriod> out;
  for (std::size_t i = 0; i < sums.size(); ++i) {
    const Row& row = decoder.rows()[i];
    if (decoder.single() && i < weights.size()) {
      weigh(sums[i], weights[i]);
    }
    out.push_back(
        {.begin = row.begin, .scans = row.scans, .covered_ms = row.covered_ms, .sums = sums[i]});
  }
  return out;
}

}  // namespace lostwork
