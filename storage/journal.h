// The alarm journal in the file: rows that are only ever added, each chained to the one before.
//
// hash of a row: SHA-256 over the 32 bytes of the previous row's hash (zeros for the first) and the
// row's columns in the order of the table: whole numbers as 8 bytes little-endian, texts as their
// length in the same form and their bytes.
#pragma once

#include "storage/database.h"
#include "storage/history.h"
#include "storage/rows.h"

#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

// In a transaction. A row that is in the journal already (same time, machine, alarm, states, user
// and comment) is not added again.
void write_journal(Database& database, const std::vector<AlarmRow>& alarms);

[[nodiscard]] std::vector<JournalRow> read_journal(Database& database, const JournalQuery& query);

// The first row whose hash does not follow from its words and the row before; the number after the
// last row where rows were taken from the end.
[[nodiscard]] std::optional<std::int64_t> first_broken_row(Database& database);

}  // namespace lostwork
