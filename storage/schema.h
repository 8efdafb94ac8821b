// The tables, as numbered scripts, and how a file is brought up to them.
#pragma once

#include <span>
#include <string_view>

namespace lostwork {

class Database;

// Script n (from 1) leads from version n - 1 to version n. A script that was published is never
// changed. Embedded at build time from schema/*.sql.
[[nodiscard]] std::span<const std::string_view> schema_scripts();

// "LWRK": tells our files from other databases.
inline constexpr int application_id = 0x4C57524B;

// Brings the file up to the last script, each script in a transaction of its own; a new file gets
// them all. Throws std::runtime_error with one sentence: of another program, of a later version.
void migrate(Database& database, std::span<const std::string_view> scripts);

// For readers. Throws: of another program, of a later version, of an older one that no writer has
// brought up to date yet.
void require_version(Database& database, std::span<const std::string_view> scripts);

}  // namespace lostwork
