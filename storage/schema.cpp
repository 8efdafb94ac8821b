#include "storage/schema.h"

#include "storage/database.h"

#include <cstddef>
#include <cstdint>
#include <stdexcept>
#include <string>

namespace lostwork {
namespace {

std::size_t checked_version(Database& database, std::size_t known) {
  const std::int64_t version = database.integer("PRAGMA user_version");
  if (database.integer("PRAGMA application_id") != application_id) {
    throw std::runtime_error{database.file() + ": is a database of another program"};
  }
  if (version < 1 || static_cast<std::uint64_t>(version) > known) {
    throw std::runtime_error{database.file() +
                             ": was written by a later version of lostwork (its "
                             "tables are version " +
                             std::to_string(version) + ", this program knows up to " +
                             std::to_string(known) + ")"};
  }
  return static_cast<std::size_t>(version);
}

bool is_empty(Database& database) {
  return database.integer("PRAGMA user_version") == 0 &&
         database.integer("PRAGMA application_id") == 0 &&
         database.integer("SELECT count(*) FROM sqlite_schema") == 0;
}

}  // namespace

void migrate(Database& database, std::span<const std::string_view> scripts) {
  const std::size_t from = is_empty(database) ? 0 : checked_version(database, scripts.size());
  for (std::size_t i = from; i < scripts.size(); ++i) {
    Transaction transaction{database, Transaction::Kind::write};
    database.run(std::string{scripts[i]});
    // Whole numbers of our own: pragmas take no parameters.
    database.run("PRAGMA user_version = " + std::to_string(i + 1));
    database.run("PRAGMA application_id = " + std::to_string(application_id));
    transaction.commit();
  }
}

void require_version(Database& database, std::span<const std::string_view> scripts) {
  const std::size_t version = is_empty(database) ? 0 : checked_version(database, scripts.size());
  if (version < scripts.size()) {
    throw std::runtime_error{database.file() +
                             ": was written by an older version of lostwork; let the daemon open "
                             "it once, which brings it up to date"};
  }
}

}  // namespace lostwork
