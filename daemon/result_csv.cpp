#include "daemon/result_csv.h"

#include "daemon/csv.h"
#include "daemon/local_time.h"

#include <array>
#include <charconv>

namespace lostwork {
namespace {

void append(std::string& line, double value) {
  std::array<char, 32> buffer{};
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value);
  line.append(buffer.data(), end.ptr);
}

}  // namespace

void write_result_header(std::ostream& out) {
  std::string line = "time,machine,mode,steady,level";
  for (const QuantityInfo& quantity : quantities()) {
    line.append(",").append(quantity.name).append(",").append(quantity.name).append("_u");
  }
  out << line << ",reasons\n";
}

void write_result_row(std::ostream& out, std::string_view machine, const Assessment& assessment) {
  std::string line = iso_text(assessment.time) + ',' + csv_field(machine) + ',' +
                     std::string{name(assessment.mode)} + (assessment.steady ? ",1," : ",0,") +
                     std::string{name(assessment.level)};
  std::string reasons;
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto quantity = static_cast<Quantity>(i);
    const Result<Measured>& value = assessment.values[quantity];
    if (value) {
      const Measured edge = at_the_edge(quantity, *value);
      line += ',';
      append(line, edge.value);
      line += ',';
      append(line, edge.u);
    } else {
      line += ",,";
      reasons.append(reasons.empty() ? "" : ";").append(info(quantity).name).append(":");
      reasons.append(name(value.error().code));
    }
  }
  out << line << ',' << reasons << '\n';
}

}  // namespace lostwork
