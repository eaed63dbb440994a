// Calibrated short-range terms of a Binder, one for each contact target.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/contact/calibration.hpp>
#include <gapwright/join/planar.hpp>

#include <map>
#include <memory>
#include <mutex>
#include <string>

namespace gapwright {

/// The term, and the term solved from the sheets' energy and slope off by their numerical errors.
struct ContactTerm {
  PairFunction nominal;
  PairFunction energy_off;
  PairFunction slope_off;

  /// Error of a contact energy: `of` maps a pair function to it.
  template <typename Energy>
  Estimate estimate(Energy of) const;
};

class ContactTerms {
 public:
  ContactTerms(const Catalogs& catalogs, const Carbon& carbon, TubeCache& cache)
      : catalogs_(catalogs), carbon_(carbon), cache_(cache) {}

  const ContactTerm& term(const std::string& target);
  /// Two flat sheets of the model, spacing 0.2 nm … 10 µm.
  PlanarEnergy sheets(double spacing_nm);

 private:
  const SheetScatterer& sheet_for(double spacing_nm);

  const Catalogs& catalogs_;
  const Carbon& carbon_;
  TubeCache& cache_;
  std::mutex terms_mutex_;
  std::map<std::string, ContactTerm> terms_;
  std::mutex sheets_mutex_;
  std::unique_ptr<SheetScatterer> near_, far_;
};

template <typename Energy>
Estimate ContactTerm::estimate(Energy of) const {
  const double value = of(nominal);
  return {value, std::abs(of(energy_off) - value) + std::abs(of(slope_off) - value)};
}

}  // namespace gapwright
