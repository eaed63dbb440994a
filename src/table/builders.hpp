// What the tables of all kinds have in common.
#pragma once

#include <gapwright/pair/potential.hpp>
#include <gapwright/table/outer_cut.hpp>
#include <gapwright/table/table.hpp>

namespace gapwright {

/// The gap at which tables without a cut end: beyond, energies without retardation say little.
inline constexpr double last_gap_nm = 10.0;
/// How far two tubes are followed where energies are integrated over all distances.
inline constexpr double endless_gap_nm = 100.0;

/// Names, sizes, distances and settings of a checked request.
Table begin_table(const Binder& binder, const TableRequest& request);

/// Two parallel tubes from the table's first distance to its last, or further.
PairPotential parallel_potential(const Binder& binder, const TableRequest& request,
                                 const Table& table, double reach_gap_nm);

/// The function itself, or with the table's outer cut.
EnergyFunction with_cut(EnergyFunction function, const Table& table);
/// What the cut adds below its switch; nothing without a cut.
std::optional<double> cut_shift(const EnergyFunction& function, const Table& table);

/// Notes the well of an energy.
void note_well(const EnergyFunction& function, Table& table);

/// Takes up the errors of a dispersion and judges the table by them.
void take_errors(const PairPotential& potential, Table& table);
void note_too_close(Table& table);
void judge(Table& table);

Table parallel_table(const Binder& binder, const TableRequest& request);
Table crossed_table(const Binder& binder, const TableRequest& request);
Table bead_table(const Binder& binder, const TableRequest& request);

}  // namespace gapwright
