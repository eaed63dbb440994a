#include <gapwright/catalog/media.hpp>

namespace gapwright {

double Medium::permittivity(double xi_eV) const {
  double sum = 1.0;
  for (const Relaxation& r : relaxations) sum += r.strength / (1.0 + xi_eV / r.energy_eV);
  for (const Oscillator& o : oscillators)
    sum += o.strength_eV2 / (o.energy_eV * o.energy_eV + xi_eV * (o.damping_eV + xi_eV));
  return sum;
}

}  // namespace gapwright
