#include "storage/words.h"

#include "storage/database.h"

#include <limits>
#include <utility>

namespace lostwork {
namespace {

// A blame is a literal of the program; this bounds what a mistake could do to the file.
constexpr std::int64_t most_words = std::numeric_limits<std::uint16_t>::max();
constexpr std::size_t longest_word = 200;

}  // namespace

void Words::remember(std::uint16_t number, std::string text) {
  const std::string_view kept = texts_.emplace_back(std::move(text));
  numbers_[kept] = number;
  by_number_[number] = kept;
}

std::uint16_t Words::number(std::string_view text) {
  text = text.substr(0, longest_word);
  if (text.empty()) {
    return 0;
  }
  if (const auto found = numbers_.find(text); found != numbers_.end()) {
    return found->second;
  }
  Statement insert{database_,
                   "INSERT OR IGNORE INTO word (number, text) "
                   "SELECT coalesce(max(number), 0) + 1, ?1 FROM word"};
  if (database_.integer("SELECT count(*) FROM word") < most_words) {
    insert.run(text);
  }
  Statement select{database_, "SELECT number FROM word WHERE text = ?1"};
  Rows rows{select, text};
  const std::uint16_t number = rows.next() ? static_cast<std::uint16_t>(rows.integer(0)) : 0;
  remember(number, std::string{text});
  return number;
}

std::string_view Words::text(std::uint16_t number) {
  if (number == 0) {
    return {};
  }
  if (const auto found = by_number_.find(number); found != by_number_.end()) {
    return found->second;
  }
  Statement select{database_, "SELECT text FROM word WHERE number = ?1"};
  Rows rows{select, std::int64_t{number}};
  if (!rows.next()) {
    return {};
  }
  remember(number, rows.text(0));
  return by_number_[number];
}

void Words::forget() {
  numbers_.clear();
  by_number_.clear();
}

}  // namespace lostwork
