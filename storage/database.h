// A connection to SQLite, its statements and its transactions, each released by its destructor.
//
// One thread for each connection. Everything throws std::runtime_error with one sentence,
// "plant.db: the disk is full"; inside storage/ only: Store::write() turns it into a result.
#pragma once

#include <cstdint>
#include <span>
#include <stdexcept>
#include <string>
#include <string_view>

struct sqlite3;
struct sqlite3_stmt;

namespace lostwork {

class Database {
 public:
  // Both refuse what is not a database. The writer's makes the file if there is none.
  static Database writer(const std::string& file);
  static Database reader(const std::string& file);
  Database(Database&& from) noexcept;
  Database& operator=(Database&&) = delete;
  Database(const Database&) = delete;
  Database& operator=(const Database&) = delete;
  ~Database();

  // Statements without parameters and results; several, separated by semicolons.
  void run(const std::string& sql);
  [[nodiscard]] std::int64_t integer(const std::string& sql);  // the first column of the first row
  [[nodiscard]] std::string text(const std::string& sql);
  [[nodiscard]] std::int64_t rows_changed() const;  // by the last INSERT, UPDATE or DELETE
  [[nodiscard]] const std::string& file() const { return file_; }
  [[noreturn]] void fail(int code) const;  // a code of SQLite

 private:
  friend class Statement;
  friend class Transaction;
  Database(std::string file, int flags);
  sqlite3* connection_ = nullptr;
  std::string file_;
};

// Prepared once and used many times. Parameters and columns count from 1 and from 0, as in SQLite.
class Statement {
 public:
  Statement(Database& database, std::string_view sql);
  Statement(const Statement&) = delete;
  Statement& operator=(const Statement&) = delete;
  ~Statement();

  // For what gives no rows.
  template <class... Values>
  void run(const Values&... values) {
    bind_all(values...);
    finish();
  }

 private:
  friend class Rows;
  struct Null {};

 public:
  static constexpr Null null{};

 private:
  template <class... Values>
  void bind_all(const Values&... values) {
    int parameter = 0;
    (bind(++parameter, values), ...);
  }
  void bind(int parameter, std::int64_t value);
  void bind(int parameter, int value) { bind(parameter, std::int64_t{value}); }
  void bind(int parameter, std::uint32_t value) { bind(parameter, std::int64_t{value}); }
  void bind(int parameter, double value);
  void bind(int parameter, std::string_view text);
  void bind(int parameter, const std::string& text) { bind(parameter, std::string_view{text}); }
  void bind(int parameter, const char* text) { bind(parameter, std::string_view{text}); }
  void bind(int parameter, std::span<const std::uint8_t> blob);
  void bind(int parameter, Null nothing);
  [[nodiscard]] bool step();
  void finish();
  void reset() noexcept;

  Database& database_;
  sqlite3_stmt* statement_ = nullptr;
};

// The rows of one question; ends it when it goes. What was bound must live as long.
class Rows {
 public:
  template <class... Values>
  explicit Rows(Statement& statement, const Values&... values) : statement_{statement} {
    statement_.bind_all(values...);
  }
  Rows(const Rows&) = delete;
  Rows& operator=(const Rows&) = delete;
  ~Rows() { statement_.reset(); }

  [[nodiscard]] bool next() { return statement_.step(); }
  [[nodiscard]] bool is_null(int column) const;
  [[nodiscard]] std::int64_t integer(int column) const;
  [[nodiscard]] double real(int column) const;
  [[nodiscard]] std::string text(int column) const;
  // Until the next row.
  [[nodiscard]] std::span<const std::uint8_t> blob(int column) const;

 private:
  Statement& statement_;
};

// Rolled back unless committed.
class Transaction {
 public:
  enum class Kind : std::uint8_t { write, read };
  Transaction(Database& database, Kind kind);
  Transaction(const Transaction&) = delete;
  Transaction& operator=(const Transaction&) = delete;
  ~Transaction();
  void commit();

 private:
  Database& database_;
  bool open_ = true;
};

}  // namespace lostwork
