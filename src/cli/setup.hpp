// What every command needs: catalogues, settings, threads, kernels.
#pragma once

#include "words.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/pair/binder.hpp>

#include <string>
#include <vector>

namespace gapwright::cli {

/// Selects the kernel variant and the number of threads inside a single body; call first.
void prepare_machine(const Words& words);
/// --threads; 0: all cores.
int thread_count(const Words& words);
/// The built-in catalogues or those of --catalogs.
Catalogs load_catalogs(const Words& words);
/// 300 K, undoped, the default entries of the catalogues.
Settings usual_settings();
/// The options on top of `base`; each error names its option.
Settings read_settings(const Words& words, const Catalogs& catalogs,
                       Settings base = usual_settings());
/// True when an option of read_settings was given.
bool has_settings(const Words& words);

/// What --version prints.
std::string version_text(const Catalogs& catalogs, bool json);

}  // namespace gapwright::cli
