// Reads the tables of tests/reference for the property tests.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// Rows of a CSV with a header; lines that begin with # are left out, a quoted cell may hold commas.
class ReferenceTable {
 public:
  // Throws std::runtime_error where the file or a column is missing.
  explicit ReferenceTable(std::string_view file);
  [[nodiscard]] std::size_t size() const { return rows_.size(); }
  [[nodiscard]] std::string text(std::size_t row, std::string_view column) const;
  [[nodiscard]] std::optional<double> number(std::size_t row, std::string_view column) const;

 private:
  std::vector<std::string> columns_;
  std::vector<std::vector<std::string>> rows_;
};

// One row of a table of states.
struct ReferenceState {
  std::size_t row;
  std::string kind;
  double T_K;
  double p_Pa;
  std::optional<double> quality;
  double rho_kgm3;
  double h_Jkg;
  double s_JkgK;
  std::optional<double> cp_JkgK;
  std::optional<double> sound_speed_w;
};

// The table of one fluid: R1234ze(E) has r1234zee_states.csv.
[[nodiscard]] std::vector<ReferenceState> reference_states(std::string_view fluid);

// The letters and digits of a name, as a test can be called: R1234zeE.
[[nodiscard]] std::string test_name(std::string_view fluid);

}  // namespace lostwork
