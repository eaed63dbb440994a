#include "store_schema.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/math/kernel.hpp>

#include <fstream>
#include <string_view>

#include <fmt/format.h>

namespace gapwright {
namespace {

constexpr std::int64_t application_id = 0x67617077;  // "gapw"
constexpr std::int64_t schema_version = 4;
constexpr std::string_view sqlite_signature("SQLite format 3\0", 16);

InputError refused(const std::filesystem::path& file, const std::string& what,
                   const std::string& expected) {
  return InputError(
      {.what = what, .where = file.string(), .excerpt = {}, .expected = expected, .nearest = {}});
}

bool has_other_content(const std::filesystem::path& file) {
  std::ifstream stream(file, std::ios::binary);
  char head[16] = {};
  stream.read(head, sizeof head);
  const auto count = static_cast<std::size_t>(stream.gcount());
  return count > 0 && std::string_view(head, count) != sqlite_signature;
}

std::string column_definitions() {
  std::string columns;
  for (const BindingField& field : binding_fields())
    columns += fmt::format(", {} {}", field.name, field.is_text ? "TEXT" : "REAL");
  return columns;
}

}  // namespace

void require_store_path(const std::filesystem::path& file, bool must_exist) {
  namespace fs = std::filesystem;
  std::error_code error;
  const fs::file_status status = fs::status(file, error);
  if (status.type() == fs::file_type::not_found) {
    if (must_exist) throw refused(file, "no such store", "a file that rank --store wrote");
    const fs::path parent = file.has_parent_path() ? file.parent_path() : fs::path(".");
    if (!fs::is_directory(parent, error))
      throw refused(file, "folder " + parent.string() + " does not exist", "an existing folder");
    return;
  }
  if (status.type() == fs::file_type::directory)
    throw refused(file, "is a folder", "a file name for the store");
  if (status.type() != fs::file_type::regular)
    throw refused(file, "is no ordinary file", "a file name for the store");
  if (has_other_content(file))
    throw refused(file, "is no store: not an SQLite database",
                  "a file that rank --store wrote, or a new file name");
}

bool is_fresh(const Database& database) {
  return database.integer("PRAGMA application_id") == 0 &&
         database.integer("PRAGMA user_version") == 0 &&
         database.integer("SELECT count(*) FROM sqlite_master") == 0;
}

void require_store(const Database& database) {
  if (database.integer("PRAGMA application_id") != application_id)
    throw refused(database.file(), "is an SQLite database, but no store of gapwright",
                  "a file that rank --store wrote, or a new file name");
  const std::int64_t version = database.integer("PRAGMA user_version");
  if (version != schema_version)
    throw refused(database.file(),
                  fmt::format("the store has layout {}, made by another version", version),
                  fmt::format("layout {}, or a new file name", schema_version));
  const std::string verdict = database.text("PRAGMA quick_check(1)");
  if (verdict != "ok")
    throw refused(database.file(), "the store is damaged: " + verdict,
                  "an undamaged copy, or a new file name");
}

void create_schema(const Database& database, const StoreOrigin& origin) {
  database.execute(fmt::format("PRAGMA application_id = {}", application_id));
  database.execute(fmt::format("PRAGMA user_version = {}", schema_version));
  database.execute(
      "CREATE TABLE store(program_version TEXT, numerics_version TEXT, catalog_hash TEXT,"
      " kernel TEXT, settings_key TEXT, temperature_K REAL, chemical_potential_eV REAL,"
      " medium TEXT, retarded INTEGER, hopping TEXT, background TEXT, contact_target TEXT,"
      " tolerance REAL);"
      "CREATE TABLE objects(label TEXT PRIMARY KEY, kind TEXT, diameter_nm REAL,"
      " chiral_angle_deg REAL, band_gap_eV REAL) WITHOUT ROWID;"
      "CREATE TABLE failures(key TEXT PRIMARY KEY, object_1 TEXT, object_2 TEXT, status TEXT,"
      " message TEXT) WITHOUT ROWID;"
      "CREATE TABLE runs(id INTEGER PRIMARY KEY, started TEXT, ended TEXT, completed INTEGER,"
      " rows_computed INTEGER, program_version TEXT, threads INTEGER, plan TEXT);");
  database.execute("CREATE TABLE pairs(key TEXT PRIMARY KEY" + column_definitions() + ")");

  const Settings& settings = origin.settings;
  Statement insert(database, "INSERT INTO store VALUES(?,?,?,?,?,?,?,?,?,?,?,?,?)");
  insert.bind(0, origin.program_version)
      .bind(1, origin.numerics_version)
      .bind(2, origin.catalog_hash)
      .bind(3, origin.kernel)
      .bind(4, origin.settings_key)
      .bind(5, settings.conditions.temperature_K)
      .bind(6, settings.conditions.chemical_potential_eV)
      .bind(7, settings.conditions.medium)
      .bind(8, std::int64_t{settings.conditions.retarded})
      .bind(9, settings.hopping)
      .bind(10, settings.background)
      .bind(11, settings.contact_target)
      .bind(12, settings.tolerance);
  insert.step();
}

StoreOrigin read_origin(const Database& database) {
  Statement row(database,
                "SELECT program_version, numerics_version, catalog_hash, kernel, settings_key,"
                " temperature_K, chemical_potential_eV, medium, retarded, hopping, background,"
                " contact_target, tolerance FROM store");
  if (!row.step())
    throw refused(database.file(), "the store is damaged: its first table is empty",
                  "an undamaged copy, or a new file name");
  return {.program_version = row.text(0),
          .numerics_version = row.text(1),
          .catalog_hash = row.text(2),
          .kernel = row.text(3),
          .settings_key = row.text(4),
          .settings = {.conditions = {.temperature_K = row.number(5),
                                      .chemical_potential_eV = row.number(6),
                                      .medium = row.text(7),
                                      .retarded = row.integer(8) != 0},
                       .hopping = row.text(9),
                       .background = row.text(10),
                       .contact_target = row.text(11),
                       .tolerance = row.number(12)}};
}

StoreOrigin origin_of(const Binder& binder) {
  return {.program_version = std::string(program_version()),
          .numerics_version = std::string(numerics_version()),
          .catalog_hash = binder.catalogs().hash(),
          .kernel = std::string(kernel_word(kernel_variant())),
          .settings_key = binder.settings_key(),
          .settings = binder.settings()};
}

void require_same(const StoreOrigin& stored, const StoreOrigin& now,
                  const std::filesystem::path& file) {
  std::vector<std::string> differences;
  const auto compare = [&](const char* name, const auto& before, const auto& after) {
    if (before != after) differences.push_back(fmt::format("{} {}, now {}", name, before, after));
  };
  const Settings& a = stored.settings;
  const Settings& b = now.settings;
  compare("version of the numbers", stored.numerics_version, now.numerics_version);
  compare("kernel", stored.kernel, now.kernel);
  compare("temperature_K", a.conditions.temperature_K, b.conditions.temperature_K);
  compare("chemical_potential_eV", a.conditions.chemical_potential_eV,
          b.conditions.chemical_potential_eV);
  compare("medium", a.conditions.medium, b.conditions.medium);
  compare("retarded", a.conditions.retarded, b.conditions.retarded);
  compare("hopping", a.hopping, b.hopping);
  compare("background", a.background, b.background);
  compare("contact_target", a.contact_target, b.contact_target);
  compare("tolerance", a.tolerance, b.tolerance);
  if (differences.empty() && stored.settings_key == now.settings_key) return;
  if (differences.empty())
    compare("values of the catalogues (hash)", stored.catalog_hash, now.catalog_hash);
  throw refused(file, "the store was made under other settings: " + joined(differences),
                "the settings of the store, or another file name");
}

}  // namespace gapwright
