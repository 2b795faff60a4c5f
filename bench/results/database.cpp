#include "bench/results/database.hpp"

#include <fmt/format.h>
#include <sqlite3.h>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

[[noreturn]] void fail(sqlite3* handle) { throw SystemFault(fmt::format("run.sqlite: {}", sqlite3_errmsg(handle))); }

struct Binder {
  sqlite3_stmt* statement;
  int index;
  int operator()(std::monostate) const { return sqlite3_bind_null(statement, index); }
  int operator()(std::int64_t value) const { return sqlite3_bind_int64(statement, index, value); }
  int operator()(double value) const { return sqlite3_bind_double(statement, index, value); }
  int operator()(std::string_view text) const {
    return sqlite3_bind_text(statement, index, text.data(), static_cast<int>(text.size()), SQLITE_TRANSIENT);
  }
  int operator()(Blob blob) const {
    return sqlite3_bind_blob64(statement, index, blob.bytes.data(), blob.bytes.size(), SQLITE_TRANSIENT);
  }
};

sqlite3_stmt* prepare(sqlite3* handle, const std::string& sql) {
  sqlite3_stmt* statement = nullptr;
  if (sqlite3_prepare_v2(handle, sql.c_str(), -1, &statement, nullptr) != SQLITE_OK) fail(handle);
  return statement;
}

void bind(sqlite3* handle, sqlite3_stmt* statement, std::initializer_list<Cell> values) {
  int index = 1;
  for (const Cell& value : values) {
    if (std::visit(Binder{statement, index++}, value) != SQLITE_OK) fail(handle);
  }
}

}  // namespace

Cell cell_of(const std::optional<double>& value) { return value ? Cell{*value} : Cell{}; }
Cell cell_of(const std::optional<long long>& value) { return value ? Cell{static_cast<std::int64_t>(*value)} : Cell{}; }

Database::Database(const std::filesystem::path& path, DatabaseUse use) {
  // Also for reading: what a killed run left in the write-ahead file must be taken in first.
  const int flags = SQLITE_OPEN_READWRITE | (use == DatabaseUse::Write ? SQLITE_OPEN_CREATE : 0);
  if (sqlite3_open_v2(path.c_str(), &handle_, flags, nullptr) != SQLITE_OK) {
    const std::string reason = sqlite3_errmsg(handle_);
    sqlite3_close(handle_);
    throw SystemFault(fmt::format("{}: {}", path.string(), reason));
  }
  sqlite3_busy_timeout(handle_, 5000);
  if (use == DatabaseUse::Read) return;
  execute("PRAGMA journal_mode=WAL");
  execute("PRAGMA synchronous=NORMAL");
}

Database::~Database() { sqlite3_close(handle_); }

void Database::execute(const std::string& sql) {
  if (sqlite3_exec(handle_, sql.c_str(), nullptr, nullptr, nullptr) != SQLITE_OK) fail(handle_);
}

std::optional<std::string> Database::first_text(const std::string& sql, std::initializer_list<Cell> values) {
  sqlite3_stmt* statement = prepare(handle_, sql);
  bind(handle_, statement, values);
  std::optional<std::string> text;
  const int status = sqlite3_step(statement);
  if (status == SQLITE_ROW && sqlite3_column_type(statement, 0) != SQLITE_NULL) {
    const auto* bytes = static_cast<const char*>(sqlite3_column_blob(statement, 0));
    text = std::string(bytes == nullptr ? "" : bytes, static_cast<std::size_t>(sqlite3_column_bytes(statement, 0)));
  }
  sqlite3_finalize(statement);
  if (status != SQLITE_ROW && status != SQLITE_DONE) fail(handle_);
  return text;
}

void Database::settle() { execute("PRAGMA journal_mode=DELETE"); }

Statement::Statement(Database& database, const std::string& sql)
    : database_(database), statement_(prepare(database.handle_, sql)) {}

Statement::~Statement() { sqlite3_finalize(statement_); }

void Statement::run(std::initializer_list<Cell> values) {
  bind(database_.handle_, statement_, values);
  if (sqlite3_step(statement_) != SQLITE_DONE) fail(database_.handle_);
  sqlite3_reset(statement_);
}

}  // namespace cistern
