// The texts that reasons blame, as numbers in the file.
#pragma once

#include <cstdint>
#include <deque>
#include <string>
#include <string_view>
#include <unordered_map>

namespace lostwork {

class Database;

// The views that text() gives live as long as the Words.
class Words {
 public:
  explicit Words(Database& database) : database_{database} {}
  // 0: the empty text, or one too many. Adds it to the file where it is new: for the writer, in a
  // transaction.
  [[nodiscard]] std::uint16_t number(std::string_view text);
  // Empty for a number that is not in the file.
  [[nodiscard]] std::string_view text(std::uint16_t number);
  // After a transaction that failed: numbers given in it are not in the file.
  void forget();

 private:
  void remember(std::uint16_t number, std::string text);
  Database& database_;
  std::deque<std::string> texts_;  // never shortened
  std::unordered_map<std::string_view, std::uint16_t> numbers_;
  std::unordered_map<std::uint16_t, std::string_view> by_number_;
};

}  // namespace lostwork
