#include "storage/database.h"

#include <memory>
#include <sys/stat.h>
#include <system_error>
#include <utility>

#include <sqlite3.h>

namespace lostwork {
namespace {

// For another program that holds the file for a moment.
constexpr int busy_wait_ms = 2000;

std::string io_reason(sqlite3* connection) {
  const int error = connection == nullptr ? 0 : sqlite3_system_errno(connection);
  return error == 0 ? std::string{} : " (" + std::generic_category().message(error) + ")";
}

std::string reason(sqlite3* connection, int code) {
  switch (code & 0xFF) {
    case SQLITE_BUSY:
    case SQLITE_LOCKED: return "is locked by another program";
    case SQLITE_FULL: return "the disk is full";
    case SQLITE_IOERR: return "cannot be read or written" + io_reason(connection);
    case SQLITE_READONLY:
    case SQLITE_PERM:
    case SQLITE_AUTH: return "may not be written: no permission";
    case SQLITE_CANTOPEN: return "cannot be opened" + io_reason(connection);
    case SQLITE_CORRUPT: return "is damaged";
    case SQLITE_NOTADB: return "is not a database";
    case SQLITE_NOMEM: return "out of memory";
    default:
      return std::string{"refused: "} +
             (connection == nullptr ? sqlite3_errstr(code) : sqlite3_errmsg(connection));
  }
}

bool is_there(const std::string& file) {
  struct stat about {};
  return stat(file.c_str(), &about) == 0;
}

bool is_folder(const std::string& file) {
  struct stat about {};
  return stat(file.c_str(), &about) == 0 && S_ISDIR(about.st_mode);
}

// As a URI in which SQLite takes the file for one that nobody changes: for a folder that cannot
// hold the files beside it.
std::string unchanging(const std::string& file) {
  std::string out = "file:";
  for (const char c : file) {
    constexpr std::string_view digits = "0123456789ABCDEF";
    if (c == '%' || c == '?' || c == '#') {
      const auto byte = static_cast<unsigned char>(c);
      out += {'%', digits[byte >> 4U], digits[byte & 15U]};
    } else {
      out += c;
    }
  }
  return out + "?immutable=1";
}

}  // namespace

Database::Database(std::string file, int flags) : file_{std::move(file)} {
  const int code = sqlite3_open_v2(file_.c_str(), &connection_,
                                   flags | SQLITE_OPEN_NOMUTEX | SQLITE_OPEN_EXRESCODE, nullptr);
  if (code != SQLITE_OK) {
    const std::string why = file_ + ": " + reason(connection_, code);
    sqlite3_close(connection_);
    throw std::runtime_error{why};
  }
  sqlite3_busy_timeout(connection_, busy_wait_ms);
}

Database::Database(Database&& from) noexcept
    : connection_{std::exchange(from.connection_, nullptr)}, file_{std::move(from.file_)} {}

Database::~Database() {
  sqlite3_close(connection_);
}

Database Database::writer(const std::string& file) {
  if (is_folder(file)) {
    throw std::runtime_error{file + ": is a folder, not a database"};
  }
  Database out{file, SQLITE_OPEN_READWRITE | SQLITE_OPEN_CREATE};
  if (sqlite3_db_readonly(out.connection_, "main") == 1) {
    out.fail(SQLITE_READONLY);
  }
  out.run("SELECT count(*) FROM sqlite_schema");
  return out;
}

Database Database::reader(const std::string& file) {
  if (!is_there(file)) {
    throw std::runtime_error{file + ": there is no such file"};
  }
  if (is_folder(file)) {
    throw std::runtime_error{file + ": is a folder, not a database"};
  }
  try {
    Database out{file, SQLITE_OPEN_READONLY};
    out.run("SELECT count(*) FROM sqlite_schema");
    return out;
  } catch (const std::runtime_error&) {
    if (is_there(file + "-wal")) {
      throw;
    }
  }
  // No writer, and a folder in which not even a reader may make its shared memory.
  Database out{unchanging(file), SQLITE_OPEN_READONLY | SQLITE_OPEN_URI};
  out.file_ = file;
  out.run("SELECT count(*) FROM sqlite_schema");
  return out;
}

void Database::fail(int code) const {
  throw std::runtime_error{file_ + ": " + reason(connection_, code)};
}

void Database::run(const std::string& sql) {
  const int code = sqlite3_exec(connection_, sql.c_str(), nullptr, nullptr, nullptr);
  if (code != SQLITE_OK) {
    fail(code);
  }
}

std::int64_t Database::integer(const std::string& sql) {
  Statement statement{*this, sql};
  Rows rows{statement};
  return rows.next() ? rows.integer(0) : 0;
}

std::string Database::text(const std::string& sql) {
  Statement statement{*this, sql};
  Rows rows{statement};
  return rows.next() ? rows.text(0) : std::string{};
}

std::int64_t Database::rows_changed() const {
  return sqlite3_changes64(connection_);
}

Statement::Statement(Database& database, std::string_view sql) : database_{database} {
  const int code =
      sqlite3_prepare_v3(database_.connection_, sql.data(), static_cast<int>(sql.size()),
                         SQLITE_PREPARE_PERSISTENT, &statement_, nullptr);
  if (code != SQLITE_OK) {
    database_.fail(code);
  }
}

Statement::~Statement() {
  sqlite3_finalize(statement_);
}

void Statement::bind(int parameter, std::int64_t value) {
  if (const int code = sqlite3_bind_int64(statement_, parameter, value); code != SQLITE_OK) {
    database_.fail(code);
  }
}

void Statement::bind(int parameter, double value) {
  if (const int code = sqlite3_bind_double(statement_, parameter, value); code != SQLITE_OK) {
    database_.fail(code);
  }
}

void Statement::bind(int parameter, std::string_view text) {
  // An empty view may have no address, which SQLite would take for NULL.
  const char* from = text.empty() ? "" : text.data();
  const int code =
      sqlite3_bind_text64(statement_, parameter, from, text.size(), SQLITE_STATIC, SQLITE_UTF8);
  if (code != SQLITE_OK) {
    database_.fail(code);
  }
}

void Statement::bind(int parameter, std::span<const std::uint8_t> blob) {
  const int code = blob.empty() ? sqlite3_bind_zeroblob(statement_, parameter, 0)
                                : sqlite3_bind_blob64(statement_, parameter, blob.data(),
                                                      blob.size(), SQLITE_STATIC);
  if (code != SQLITE_OK) {
    database_.fail(code);
  }
}

void Statement::bind(int parameter, Null /*nothing*/) {
  if (const int code = sqlite3_bind_null(statement_, parameter); code != SQLITE_OK) {
    database_.fail(code);
  }
}

bool Statement::step() {
  const int code = sqlite3_step(statement_);
  if (code == SQLITE_ROW) {
    return true;
  }
  // The reason is read before reset, which may replace it.
  if (code != SQLITE_DONE) {
    const std::string why = database_.file_ + ": " + reason(database_.connection_, code);
    reset();
    throw std::runtime_error{why};
  }
  reset();
  return false;
}

void Statement::finish() {
  while (step()) {
  }
}

void Statement::reset() noexcept {
  sqlite3_reset(statement_);
}

bool Rows::is_null(int column) const {
  return sqlite3_column_type(statement_.statement_, column) == SQLITE_NULL;
}

std::int64_t Rows::integer(int column) const {
  return sqlite3_column_int64(statement_.statement_, column);
}

double Rows::real(int column) const {
  return sqlite3_column_double(statement_.statement_, column);
}

std::string Rows::text(int column) const {
  const auto blob = this->blob(column);
  return {blob.begin(), blob.end()};
}

std::span<const std::uint8_t> Rows::blob(int column) const {
  const auto* from =
      static_cast<const std::uint8_t*>(sqlite3_column_blob(statement_.statement_, column));
  const int size = sqlite3_column_bytes(statement_.statement_, column);
  return from == nullptr ? std::span<const std::uint8_t>{}
                         : std::span{from, static_cast<std::size_t>(size)};
}

Transaction::Transaction(Database& database, Kind kind) : database_{database} {
  database_.run(kind == Kind::write ? "BEGIN IMMEDIATE" : "BEGIN");
}

Transaction::~Transaction() {
  if (open_) {
    // Fails only where SQLite has rolled back by itself.
    sqlite3_exec(database_.connection_, "ROLLBACK", nullptr, nullptr, nullptr);
  }
}

void Transaction::commit() {
  database_.run("COMMIT");
  open_ = false;
}

}  // namespace lostwork
