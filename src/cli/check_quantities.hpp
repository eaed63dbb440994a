// The quantities that check can recompute, by the word catalogues use.
#pragma once

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/pair/binder.hpp>

#include <map>
#include <memory>
#include <string>

namespace gapwright::cli {

/// Binders by hopping set, made when first needed.
class CheckBench {
 public:
  CheckBench(const Catalogs& catalogs, Settings settings);
  const Binder& binder(const std::string& hopping);

 private:
  const Catalogs& catalogs_;
  Settings settings_;
  std::map<std::string, std::unique_ptr<Binder>> binders_;
};

/// Our value of a row, in the row's unit. Throws InputError for a quantity that is not known.
double our_value(const CheckRow& row, CheckBench& bench);

}  // namespace gapwright::cli
