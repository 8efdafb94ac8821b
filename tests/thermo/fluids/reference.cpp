#include "tests/thermo/fluids/reference.h"

#include <algorithm>
#include <cctype>
#include <fstream>
#include <iterator>
#include <stdexcept>

namespace lostwork {
namespace {

std::vector<std::string> cells(std::string_view line) {
  std::vector<std::string> all(1);
  bool quoted = false;
  for (const char letter : line) {
    if (letter == '"') {
      quoted = !quoted;
    } else if (letter == ',' && !quoted) {
      all.emplace_back();
    } else if (letter != '\r') {
      all.back() += letter;
    }
  }
  return all;
}

}  // namespace

ReferenceTable::ReferenceTable(std::string_view file) {
  std::ifstream in{std::string{LOSTWORK_REFERENCE "/"} += file};
  if (!in) {
    throw std::runtime_error{"missing in tests/reference: " + std::string{file}};
  }
  for (std::string line; std::getline(in, line);) {
    if (line.empty() || line.front() == '#') {
      continue;
    }
    if (columns_.empty()) {
      columns_ = cells(line);
    } else {
      rows_.push_back(cells(line));
    }
  }
}

std::string ReferenceTable::text(std::size_t row, std::string_view column) const {
  const auto found = std::find(columns_.begin(), columns_.end(), column);
  if (found == columns_.end()) {
    throw std::runtime_error{"no such column: " + std::string{column}};
  }
  return rows_.at(row).at(static_cast<std::size_t>(found - columns_.begin()));
}

std::optional<double> ReferenceTable::number(std::size_t row, std::string_view column) const {
  const std::string cell = text(row, column);
  return cell.empty() ? std::nullopt : std::optional{std::stod(cell)};
}

std::vector<ReferenceState> reference_states(std::string_view fluid) {
  std::string file = test_name(fluid);
  for (char& letter : file) {
    letter = static_cast<char>(std::tolower(static_cast<unsigned char>(letter)));
  }
  const ReferenceTable table{file + "_states.csv"};
  std::vector<ReferenceState> states;
  for (std::size_t row = 0; row < table.size(); ++row) {
    states.push_back({.row = row,
                      .kind = table.text(row, "kind"),
                      .T_K = table.number(row, "T_K").value(),
                      .p_Pa = table.number(row, "p_Pa").value(),
                      .quality = table.number(row, "Q"),
                      .rho_kgm3 = table.number(row, "rho_kg_m3").value(),
                      .h_Jkg = table.number(row, "h_J_kg").value(),
                      .s_JkgK = table.number(row, "s_J_kgK").value(),
                      .cp_JkgK = table.number(row, "cp_J_kgK"),
                      .sound_speed_w = table.number(row, "w_m_s")});
  }
  return states;
}

std::string test_name(std::string_view fluid) {
  std::string out;
  std::copy_if(fluid.begin(), fluid.end(), std::back_inserter(out),
               [](unsigned char letter) { return std::isalnum(letter) != 0; });
  return out;
}

}  // namespace lostwork
