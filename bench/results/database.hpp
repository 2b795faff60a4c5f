#pragma once
/// \file
/// A thin owner of one SQLite file. Any trouble with the file is a SystemFault.
#include <cstdint>
#include <filesystem>
#include <initializer_list>
#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

struct sqlite3;
struct sqlite3_stmt;

namespace cistern {

/// NULL, integer, real, text or bytes.
struct Blob {
  std::string_view bytes;
};
using Cell = std::variant<std::monostate, std::int64_t, double, std::string_view, Blob>;

[[nodiscard]] Cell cell_of(const std::optional<double>& value);
[[nodiscard]] Cell cell_of(const std::optional<long long>& value);

/// Write: opens or creates, in write-ahead mode so that others can read while it is written.
/// Read: leaves a file as it is found.
enum class DatabaseUse { Write, Read };

class Statement;

class Database {
 public:
  explicit Database(const std::filesystem::path& path, DatabaseUse use = DatabaseUse::Write);
  ~Database();
  Database(const Database&) = delete;
  Database& operator=(const Database&) = delete;

  void execute(const std::string& sql);
  /// One row, or nothing: the first column as text.
  [[nodiscard]] std::optional<std::string> first_text(const std::string& sql, std::initializer_list<Cell> values = {});
  /// Back to a single file without side files.
  void settle();

 private:
  friend class Statement;
  sqlite3* handle_{nullptr};
};

/// A prepared INSERT (or any statement without result rows), run once per row.
class Statement {
 public:
  Statement(Database& database, const std::string& sql);
  ~Statement();
  Statement(const Statement&) = delete;
  Statement& operator=(const Statement&) = delete;
  void run(std::initializer_list<Cell> values);

 private:
  Database& database_;
  sqlite3_stmt* statement_{nullptr};
};

}  // namespace cistern
