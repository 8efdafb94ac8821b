#include "daemon/web/ledger_rows.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace lostwork {
namespace {

struct RowKind {
  Quantity quantity;
  LedgerPart part;
  std::string_view text;
};

constexpr std::array<RowKind, 5> components{
    {
     {Quantity::lost_compressor, LedgerPart::lost, "compressor with its drive"},
     {Quantity::lost_condenser, LedgerPart::lost, "condenser"},
     {Quantity::lost_expansion, LedgerPart::lost, "expansion valve"},
     {Quantity::lost_evaporator, LedgerPart::lost, "evaporator"},
     {Quantity::lost_lines, LedgerPart::lost, "refrigerant lines"},
     }
};

// The ledger closes to 1e-9 of the power (goals.md E4); shown as complete only if it does.
constexpr double closure = 1e-9;

std::optional<Measured> share_of(const RowKind& kind, const QuantityValues& values) {
  const Result<Measured>& input = values[Quantity::power];
  const Result<Measured>& part = values[kind.quantity];
  if (!input || !part || !(input->value > 0.0)) {
    return std::nullopt;
  }
  const double share = part->value / input->value;
  if (kind.part == LedgerPart::needed && values[Quantity::second_law_efficiency]) {
    return Measured{.value = share, .u = values[Quantity::second_law_efficiency]->u};
  }
  return Measured{.value = share,
                  .u = part->u / input->value + std::abs(share) * input->u / input->value};
}

std::string_view note_on(Quantity quantity, const QuantityValues& values,
                         bool casing_surroundings_known) {
  if (!values[quantity]) {
    return {};
  }
  if (quantity == Quantity::casing && !casing_surroundings_known) {
    return "Counts as nothing: the plant file does not say how warm it is around the casing.";
  }
  const Result<Measured>& heats = values[Quantity::energy_residual];
  if (quantity == Quantity::unaccounted && !heats && heats.error().code == ReasonCode::no_sensor) {
    return "Cannot be told without the second flow meter; with one it is always 0.";
  }
  return {};
}

std::vector<RowKind> parts_of(const QuantityValues& values) {
  const Result<Measured>& lines = values[Quantity::lost_lines];
  if (lines || lines.error().code != ReasonCode::no_sensor) {
    return {components.begin(), components.end()};
  }
  std::vector<RowKind> parts{components.begin(), components.end() - 1};
  parts.back().text = "evaporator and suction line";
  return parts;
}

bool adds_up(const LedgerTable& table) {
  if (!table.input_W) {
    return false;
  }
  double sum_W = 0.0;
  for (const LedgerRow& row : table.rows) {
    if (!row.power_W) {
      return false;
    }
    sum_W += row.power_W->value;
  }
  return std::abs(sum_W - table.input_W->value) <= closure * std::abs(table.input_W->value);
}

}  // namespace

std::string_view name(LedgerPart part) {
  switch (part) {
    case LedgerPart::needed: return "needed";
    case LedgerPart::lost: return "lost";
    case LedgerPart::casing: return "casing";
    case LedgerPart::unaccounted: return "unaccounted";
  }
  return "";
}

LedgerTable ledger_table(const QuantityValues& values, bool casing_surroundings_known) {
  LedgerTable table{.rows = {}, .input_W = values[Quantity::power]};
  const auto add = [&table, &values, casing_surroundings_known](const RowKind& kind) {
    table.rows.push_back({.quantity = kind.quantity,
                          .part = kind.part,
                          .text = kind.text,
                          .power_W = values[kind.quantity],
                          .share = share_of(kind, values),
                          .note = note_on(kind.quantity, values, casing_surroundings_known)});
  };
  add({Quantity::reversible_power, LedgerPart::needed, "least power for this work"});
  const std::vector<RowKind> parts = parts_of(values);
  table.split = std::all_of(parts.begin(), parts.end(), [&values](const RowKind& kind) {
    return values[kind.quantity].has_value();
  });
  if (table.split) {
    std::for_each(parts.begin(), parts.end(), add);
  } else {
    add({Quantity::lost_total, LedgerPart::lost, "lost in the machine"});
  }
  add({Quantity::casing, LedgerPart::casing, "work value of the casing heat"});
  add({Quantity::unaccounted, LedgerPart::unaccounted, "not accounted for"});
  table.complete = adds_up(table);
  return table;
}

}  // namespace lostwork
