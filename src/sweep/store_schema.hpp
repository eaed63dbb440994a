// What a store file looks like: identity, tables, origin.
#pragma once

#include "sqlite.hpp"

#include <gapwright/sweep/store.hpp>

namespace gapwright {

/// Refuses what can be no store before SQLite touches it: a folder, a device, a missing parent, a
/// file of another kind; with must_exist also a missing file.
void require_store_path(const std::filesystem::path& file, bool must_exist);

/// True for a database without tables and identity: new, or its creation was interrupted.
bool is_fresh(const Database& database);
/// Throws InputError unless the database is an undamaged store of this schema.
void require_store(const Database& database);
/// Identity and tables; inside a transaction of the caller.
void create_schema(const Database& database, const StoreOrigin& origin);

StoreOrigin read_origin(const Database& database);
/// Origin of the rows of a binder.
StoreOrigin origin_of(const Binder& binder);
/// Throws InputError saying what differs.
void require_same(const StoreOrigin& stored, const StoreOrigin& now,
                  const std::filesystem::path& file);

}  // namespace gapwright
