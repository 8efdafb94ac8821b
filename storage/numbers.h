// The numbers that stand for machines, points and their order in the file.
#pragma once

#include "storage/rows.h"

#include <cstdint>
#include <map>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

class Database;

// For the writer: what is new is added to the file, so in a transaction.
class Numbers {
 public:
  explicit Numbers(Database& database) : database_{database} {}
  [[nodiscard]] std::int64_t machine(const std::string& id);
  // Of the order of points of that machine.
  [[nodiscard]] std::uint32_t layout(const std::shared_ptr<const MachineLayout>& layout);
  // After a transaction that failed: numbers given in it are not in the file.
  void forget();

 private:
  struct Known {
    std::shared_ptr<const MachineLayout> layout;
    std::uint32_t number = 0;
  };
  [[nodiscard]] std::int64_t point(const std::string& id);
  Database& database_;
  std::map<std::string, std::int64_t> machines_;
  std::map<std::string, Known> layouts_;  // the last one of each machine
};

// For readers.
[[nodiscard]] std::optional<std::int64_t> machine_number(Database& database, std::string_view id);
[[nodiscard]] std::vector<std::string> machine_ids(Database& database);
// Ids of the points in the order of a layout; empty where the file does not have it.
[[nodiscard]] std::vector<std::string> layout_points(Database& database, std::uint32_t layout);

}  // namespace lostwork
