-- Everything is SI and UTC; times are milliseconds since 1970.
--
-- A key is machine.number * 2^44 + time in milliseconds. A blob begins with the number of its
-- layout and ends with a CRC-32C over key and blob. sample_block.h and sums_block.h say what is in
-- between.

CREATE TABLE machine (
  number INTEGER PRIMARY KEY CHECK (number BETWEEN 1 AND 524287),
  id     TEXT NOT NULL UNIQUE
) STRICT;

CREATE TABLE point (
  number INTEGER PRIMARY KEY,
  id     TEXT NOT NULL UNIQUE
) STRICT;

-- Which points a block of samples holds: numbers of points in their order, "3,4,7".
CREATE TABLE layout (
  number  INTEGER PRIMARY KEY,
  machine INTEGER NOT NULL REFERENCES machine (number),
  points  TEXT NOT NULL,
  UNIQUE (machine, points)
) STRICT;

-- What reasons blame: the inputs at fault.
CREATE TABLE word (
  number INTEGER PRIMARY KEY CHECK (number BETWEEN 1 AND 65535),
  text   TEXT NOT NULL UNIQUE
) STRICT;

-- Consecutive scans of one machine within one hour. Key: of the first one.
CREATE TABLE sample_block (
  key   INTEGER PRIMARY KEY,
  scans BLOB NOT NULL
) STRICT;

-- Sums over the scans of each minute: minutes of one machine within one hour. A minute is in one
-- block only. Key: of the first minute's begin.
CREATE TABLE minute_block (
  key  INTEGER PRIMARY KEY,
  sums BLOB NOT NULL
) STRICT;

-- The same over hours and over days (UTC), one to a row. Key: of the begin.
CREATE TABLE hour_sums (
  key  INTEGER PRIMARY KEY,
  sums BLOB NOT NULL
) STRICT;

CREATE TABLE day_sums (
  key  INTEGER PRIMARY KEY,
  sums BLOB NOT NULL
) STRICT;

-- Closed steady windows. Key: of the begin.
CREATE TABLE steady_window (
  key    INTEGER PRIMARY KEY,
  end_ms INTEGER NOT NULL,
  scans  INTEGER NOT NULL,
  means  BLOB NOT NULL
) STRICT;

-- Append-only. hash: SHA-256 over previous_hash and the columns before it (journal.h).
CREATE TABLE alarm_journal (
  number         INTEGER PRIMARY KEY AUTOINCREMENT,
  time_ms        INTEGER NOT NULL,
  utc_offset_min INTEGER NOT NULL,
  machine        TEXT NOT NULL,
  alarm          TEXT NOT NULL,
  kind           INTEGER NOT NULL,
  from_state     INTEGER NOT NULL,
  to_state       INTEGER NOT NULL,
  priority       INTEGER NOT NULL,
  text           TEXT NOT NULL,
  evidence       TEXT NOT NULL,
  user           TEXT NOT NULL,
  comment        TEXT NOT NULL,
  previous_hash  BLOB NOT NULL,
  hash           BLOB NOT NULL,
  UNIQUE (time_ms, machine, alarm, from_state, to_state, user, comment)
) STRICT;

CREATE TRIGGER alarm_journal_keeps_rows BEFORE DELETE ON alarm_journal
BEGIN
  SELECT raise(ABORT, 'the alarm journal is append-only');
END;

CREATE TRIGGER alarm_journal_keeps_words BEFORE UPDATE ON alarm_journal
BEGIN
  SELECT raise(ABORT, 'the alarm journal is append-only');
END;

-- The state of a machine as archived, machine '': of the whole plant. checksum: CRC-32C of bytes.
CREATE TABLE machine_state (
  machine  TEXT PRIMARY KEY,
  version  INTEGER NOT NULL,
  time_ms  INTEGER NOT NULL,
  bytes    BLOB NOT NULL,
  checksum INTEGER NOT NULL
) STRICT;

CREATE TABLE plant_file (
  number  INTEGER PRIMARY KEY,
  time_ms INTEGER NOT NULL,
  hash    TEXT NOT NULL,
  text    TEXT NOT NULL
) STRICT;

-- Scans that were given up because the file could not be written and memory was full.
CREATE TABLE gap (
  number   INTEGER PRIMARY KEY,
  machine  TEXT NOT NULL,
  begin_ms INTEGER NOT NULL,
  end_ms   INTEGER NOT NULL,
  scans    INTEGER NOT NULL,
  why      TEXT NOT NULL
) STRICT;
