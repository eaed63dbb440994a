#include "ribbon_propagator.hpp"

#include "lattice_transform.hpp"

#include <algorithm>
#include <cmath>
#include <map>

namespace gapwright {

namespace {

using Complex = std::complex<double>;

/// Σ_n v_n v_nᵀ e^{-E_n τ} over the conduction states; lower triangle only.
void propagate(const ConductionStates& states, double time, Eigen::MatrixXd& sum) {
  constexpr double negligible_exponent = 45.0;
  const Eigen::Index size = states.vectors.rows();
  Eigen::Index kept = 0;
  while (kept < states.energies_eV.size() && states.energies_eV[kept] * time < negligible_exponent)
    ++kept;
  sum.setZero(size, size);
  if (kept == 0) return;
  const Eigen::VectorXd decay = (-0.5 * time * states.energies_eV.head(kept)).array().exp();
  const Eigen::MatrixXd scaled = states.vectors.leftCols(kept) * decay.asDiagonal();
  sum.selfadjointView<Eigen::Lower>().rankUpdate(scaled);
}

/// What every kind of ribbon shares: pairs of rows, series over k in blocks, offsets and their
/// tables.
class PairTransform {
 public:
  PairTransform(const StateGrid& grid, double period_nm, const std::vector<double>& waves_per_nm)
      : transform_(grid.waves, period_nm, waves_per_nm),
        columns_(static_cast<Eigen::Index>(waves_per_nm.size()) + 1) {}

  /// Number of the offset [periods], equal ones once.
  int kind_of(double offset) {
    offset -= std::floor(offset + 1e-9);
    const long key = std::lround(offset * 12);
    const auto [place, added] = kinds_.try_emplace(key, static_cast<int>(tables_.size()));
    if (added) {
      tables_.push_back(transform_.cosines(offset));
      phases_.push_back(transform_.phases(offset));
    }
    return place->second;
  }
  const std::vector<Complex>& phases(int kind) const { return phases_[kind]; }
  const Eigen::MatrixXd& cosines(int kind) const { return tables_[kind]; }
  const LatticeTransform& lattice() const { return transform_; }
  Eigen::Index columns() const { return columns_; }

 private:
  LatticeTransform transform_;
  Eigen::Index columns_;
  std::map<long, int> kinds_;
  std::vector<Eigen::MatrixXd> tables_;
  std::vector<std::vector<Complex>> phases_;
};

/// Two series over k for each pair, kept k by k as they are made.
class SeriesStore {
 public:
  SeriesStore(std::size_t pairs, int points)
      : series_(2 * pairs), points_(points), values_(series_ * points), block_(block * points) {}
  Complex* at(int i) { return &values_[series_ * i]; }
  /// One series, contiguous; ascending calls read the store in whole cache lines.
  const Complex* series(std::size_t s) {
    const std::size_t first = s / block * block;
    if (s == first) {
      const std::size_t count = std::min(block, series_ - first);
      for (int i = 0; i < points_; ++i)
        for (std::size_t b = 0; b < count; ++b)
          block_[b * points_ + i] = values_[series_ * i + first + b];
    }
    return &block_[(s - first) * points_];
  }

 private:
  static constexpr std::size_t block = 8;
  std::size_t series_;
  int points_;
  std::vector<Complex> values_;
  std::vector<Complex> block_;
};

/// The sectors' propagators give A_jj' = Σ z_j z_j'* e^{-Eτ} between left atoms and B_jj' = Σ z_j
/// z_j' e^{-Eτ} between left and right ones, z the left amplitudes; the product with the valence
/// states, which have one sublattice reversed, is A² - B² along the ribbon.
class ArmchairPropagator : public RibbonPropagator {
 public:
  ArmchairPropagator(const RibbonHamiltonian& hamiltonian, const StateGrid& grid,
                     const std::vector<double>& waves_per_nm)
      : ribbon_(hamiltonian.ribbon()),
        grid_(grid),
        pairs_(row_pairs(ribbon_.rows())),
        transform_(grid, ribbon_.period_nm(), waves_per_nm) {
    for (const RowPair& pair : pairs_) {
      const double left = left_position(ribbon_, pair.row);
      kinds_alike_.push_back(transform_.kind_of(left - left_position(ribbon_, pair.other)));
      kinds_across_.push_back(transform_.kind_of(left - right_position(ribbon_, pair.other)));
    }
  }

  Eigen::MatrixXd response(double time) const override {
    const int points = grid_.waves / 2 + 1;
    SeriesStore store(pairs_.size(), points);
    Eigen::MatrixXd even, odd;
    for (int i = 0; i < points; ++i) {
      propagate(grid_.states[i][0], time, even);
      propagate(grid_.states[i][1], time, odd);
      for (std::size_t p = 0; p < pairs_.size(); ++p) {
        const Amplitudes sum = joined(even, odd, pairs_[p]);
        store.at(i)[2 * p] = sum.alike * transform_.phases(kinds_alike_[p])[i];
        store.at(i)[2 * p + 1] = sum.across * transform_.phases(kinds_across_[p])[i];
      }
    }
    return along(store);
  }

 private:
  struct Amplitudes {
    Complex alike, across;
  };

  /// z = (s + ip)/√2 of the sector basis, from the lower triangle.
  static Amplitudes amplitudes(const Eigen::MatrixXd& sum, int row, int other) {
    const double ss = sum(2 * other, 2 * row), pp = sum(2 * other + 1, 2 * row + 1);
    const double sp = sum(2 * other + 1, 2 * row);
    const double ps = other == row ? sp : sum(2 * other, 2 * row + 1);
    return {0.5 * Complex(ss + pp, ps - sp), 0.5 * Complex(ss - pp, sp + ps)};
  }

  /// From the sectors to the rows: (even ± odd)/2, the middle row being in the even one alone.
  Amplitudes joined(const Eigen::MatrixXd& even, const Eigen::MatrixXd& odd,
                    const RowPair& pair) const {
    const int last = ribbon_.lines - 1;
    const bool far = 2 * pair.other > last;
    const int a = pair.row, b = far ? last - pair.other : pair.other;
    const int row = std::min(a, b), other = std::max(a, b);
    Amplitudes sum = amplitudes(even, row, other);
    const int middles = (2 * a == last) + (2 * b == last);
    if (middles == 0) {
      const Amplitudes minus = amplitudes(odd, row, other);
      const double sign = far ? -0.5 : 0.5;
      sum.alike = 0.5 * sum.alike + sign * minus.alike;
      sum.across = 0.5 * sum.across + sign * minus.across;
    } else if (middles == 1) {
      sum.alike *= std::sqrt(0.5);
      sum.across *= std::sqrt(0.5);
    }
    if (a > b) sum.alike = std::conj(sum.alike);  // A is Hermitian, B symmetric
    return sum;
  }

  Eigen::MatrixXd along(SeriesStore& store) const {
    Eigen::MatrixXd result(pairs_.size(), transform_.columns());
    Eigen::ArrayXd values(grid_.waves);
    const double scale = -8 / ribbon_.period_nm();
    for (std::size_t p = 0; p < pairs_.size(); ++p) {
      transform_.lattice().to_positions(store.series(2 * p), values.data());
      result.row(p) = values.square().matrix().transpose() * transform_.cosines(kinds_alike_[p]);
      transform_.lattice().to_positions(store.series(2 * p + 1), values.data());
      result.row(p) -= values.square().matrix().transpose() * transform_.cosines(kinds_across_[p]);
    }
    return scale * result;
  }

  Ribbon ribbon_;
  const StateGrid& grid_;
  std::vector<RowPair> pairs_;
  PairTransform transform_;
  std::vector<int> kinds_alike_, kinds_across_;
};

/// Of either spin the valence propagator is the conduction one with rows in reverse order and one
/// sublattice reversed: the product is ±G_jj' G_j̄j̄' along the ribbon.
class ZigzagPropagator : public RibbonPropagator {
 public:
  ZigzagPropagator(const RibbonHamiltonian& hamiltonian, const StateGrid& grid,
                   const std::vector<double>& waves_per_nm)
      : ribbon_(hamiltonian.ribbon()),
        grid_(grid),
        pairs_(row_pairs(ribbon_.rows())),
        transform_(grid, ribbon_.period_nm(), waves_per_nm) {
    for (const RowPair& pair : pairs_)
      kinds_.push_back(transform_.kind_of(left_position(ribbon_, pair.row) -
                                          left_position(ribbon_, pair.other)));
  }

  Eigen::MatrixXd response(double time) const override {
    const int points = grid_.waves / 2 + 1, last = ribbon_.rows() - 1;
    SeriesStore store(pairs_.size(), points);
    Eigen::MatrixXd sum;
    for (int i = 0; i < points; ++i) {
      propagate(grid_.states[i][0], time, sum);
      for (std::size_t p = 0; p < pairs_.size(); ++p) {
        const auto [row, other] = pairs_[p];
        const Complex phase = transform_.phases(kinds_[p])[i];
        store.at(i)[2 * p] = phase * sum(other, row);
        store.at(i)[2 * p + 1] = phase * sum(last - row, last - other);
      }
    }
    return along(store);
  }

 private:
  Eigen::MatrixXd along(SeriesStore& store) const {
    Eigen::MatrixXd result(pairs_.size(), transform_.columns());
    Eigen::ArrayXd values(grid_.waves), mirrored(grid_.waves);
    const double scale = -4 / ribbon_.period_nm();
    for (std::size_t p = 0; p < pairs_.size(); ++p) {
      transform_.lattice().to_positions(store.series(2 * p), values.data());
      transform_.lattice().to_positions(store.series(2 * p + 1), mirrored.data());
      values *= mirrored;
      const double sign = (pairs_[p].row + pairs_[p].other) % 2 == 0 ? scale : -scale;
      result.row(p) = sign * (values.matrix().transpose() * transform_.cosines(kinds_[p]));
    }
    return result;
  }

  Ribbon ribbon_;
  const StateGrid& grid_;
  std::vector<RowPair> pairs_;
  PairTransform transform_;
  std::vector<int> kinds_;
};

}  // namespace

std::unique_ptr<RibbonPropagator> ribbon_propagator(const RibbonHamiltonian& hamiltonian,
                                                    const StateGrid& grid,
                                                    const std::vector<double>& waves_per_nm) {
  if (hamiltonian.ribbon().edge == RibbonEdge::armchair)
    return std::make_unique<ArmchairPropagator>(hamiltonian, grid, waves_per_nm);
  return std::make_unique<ZigzagPropagator>(hamiltonian, grid, waves_per_nm);
}

}  // namespace gapwright
