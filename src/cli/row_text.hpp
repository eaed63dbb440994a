// Rows as JSON and CSV: numbers so that reading gives the same bits back.
#pragma once

#include <gapwright/pair/binding.hpp>
#include <gapwright/sweep/ranking.hpp>

#include <string>
#include <vector>

#include <nlohmann/json.hpp>

namespace gapwright::cli {

using Json = nlohmann::ordered_json;

/// "(5,5)@(10,10)" of walls in walls, "(5,5) (10,10)" of tubes beside or across
/// each other, "(10,10) over silica".
std::string pair_name(const Binding& row);

/// All fields, null where empty; walls in walls add `interfaces`, limits of the model `notes`, a
/// failure `message`.
Json row_json(const Binding& row);
/// rank, all fields, rank_spread.
Json ranked_json(const RankedRow& row);

/// Comment lines, each led by "# ", a header, and a line a row: rank, all fields, rank_spread.
std::string ranked_csv(const std::vector<RankedRow>& rows, const std::string& comment);

/// A comment of one or more lines, each led by "# ".
std::string comment_lines(const std::string& comment);

}  // namespace gapwright::cli
