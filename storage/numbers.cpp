#include "storage/numbers.h"

#include "storage/database.h"

#include <charconv>

namespace lostwork {
namespace {

std::int64_t number_of(Database& database, std::string_view insert_sql, std::string_view select_sql,
                       const std::string& id) {
  Statement select{database, select_sql};
  {
    Rows rows{select, id};
    if (rows.next()) {
      return rows.integer(0);
    }
  }
  Statement insert{database, insert_sql};
  insert.run(id);
  Rows rows{select, id};
  return rows.next() ? rows.integer(0) : 0;
}

std::vector<std::int64_t> whole_numbers(std::string_view text) {
  std::vector<std::int64_t> out;
  while (!text.empty()) {
    std::int64_t number = 0;
    std::from_chars(text.data(), text.data() + text.size(), number);
    out.push_back(number);
    const std::size_t comma = text.find(',');
    text = comma == std::string_view::npos ? std::string_view{} : text.substr(comma + 1);
  }
  return out;
}

}  // namespace

std::int64_t Numbers::machine(const std::string& id) {
  if (const auto found = machines_.find(id); found != machines_.end()) {
    return found->second;
  }
  const std::int64_t number = number_of(database_, "INSERT INTO machine (id) VALUES (?1)",
                                        "SELECT number FROM machine WHERE id = ?1", id);
  machines_[id] = number;
  return number;
}

std::int64_t Numbers::point(const std::string& id) {
  return number_of(database_, "INSERT INTO point (id) VALUES (?1)",
                   "SELECT number FROM point WHERE id = ?1", id);
}

std::uint32_t Numbers::layout(const std::shared_ptr<const MachineLayout>& layout) {
  Known& known = layouts_[layout->machine];
  if (known.layout == layout) {
    return known.number;
  }
  std::string points;
  for (const std::string& id : layout->points) {
    if (!points.empty()) {
      points += ',';
    }
    points += std::to_string(point(id));
  }
  const std::int64_t machine_number = machine(layout->machine);
  Statement insert{database_, "INSERT OR IGNORE INTO layout (machine, points) VALUES (?1, ?2)"};
  insert.run(machine_number, points);
  Statement select{database_, "SELECT number FROM layout WHERE machine = ?1 AND points = ?2"};
  Rows rows{select, machine_number, points};
  const std::uint32_t number = rows.next() ? static_cast<std::uint32_t>(rows.integer(0)) : 0;
  known = {.layout = layout, .number = number};
  return number;
}

void Numbers::forget() {
  machines_.clear();
  layouts_.clear();
}

std::optional<std::int64_t> machine_number(Database& database, std::string_view id) {
  Statement select{database, "SELECT number FROM machine WHERE id = ?1"};
  Rows rows{select, id};
  return rows.next() ? std::optional{rows.integer(0)} : std::nullopt;
}

std::vector<std::string> machine_ids(Database& database) {
  Statement select{database, "SELECT id FROM machine ORDER BY number"};
  Rows rows{select};
  std::vector<std::string> out;
  while (rows.next()) {
    out.push_back(rows.text(0));
  }
  return out;
}

std::vector<std::string> layout_points(Database& database, std::uint32_t layout) {
  Statement select_layout{database, "SELECT points FROM layout WHERE number = ?1"};
  Statement select_point{database, "SELECT id FROM point WHERE number = ?1"};
  Rows rows{select_layout, layout};
  std::vector<std::string> out;
  if (!rows.next()) {
    return out;
  }
  for (const std::int64_t number : whole_numbers(rows.text(0))) {
    Rows point{select_point, number};
    out.push_back(point.next() ? point.text(0) : std::string{});
  }
  return out;
}

}  // namespace lostwork
