#include "table_request.hpp"

#include "output.hpp"

#include <gapwright/lattice/candidates.hpp>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <fstream>
#include <iterator>

namespace gapwright::cli {
namespace {

constexpr std::size_t most_angles = 90;
const NumberRange distances{0, 2000, "nm"};

std::vector<std::string> split(const std::string& text, char separator) {
  std::vector<std::string> parts(1);
  for (const char c : text)
    if (c == separator)
      parts.emplace_back();
    else
      parts.back() += c;
  return parts;
}

std::vector<double> read_angles(const Words& words) {
  std::vector<double> angles;
  const auto typed = words.text("--crossed");
  if (!typed) return angles;
  for (const std::string& part : split(*typed, ',')) {
    double angle = 0.0;
    const char* end = part.data() + part.size();
    const auto [stop, problem] = std::from_chars(part.data(), end, angle);
    if (problem != std::errc() || stop != end || !std::isfinite(angle))
      throw InputError({"'" + part + "' is not a number",
                        "--crossed",
                        {},
                        "angles of 1 to 90 degrees with commas between, such as 30,60,90",
                        {}});
    angles.push_back(angle);
  }
  if (angles.size() > most_angles)
    throw InputError({"more than 90 angles", "--crossed", {}, "at most 90", {}});
  return angles;
}

TubeObject parse_tube(const std::string& label, const char* where) {
  const ParsedLabel parsed = at_option(where, [&] { return parse_label(label); });
  for (const std::string& remark : parsed.notes) note("note: " + remark);
  if (const TubeObject* tube = std::get_if<TubeObject>(&parsed.object)) return *tube;
  throw InputError({label_of(parsed.object) + " is no tube",
                    where,
                    {},
                    "tubes such as 10,10 or 5,5@10,10; this version tabulates tubes",
                    {}});
}

std::vector<TubeObject> read_series(const std::string& text) {
  std::vector<TubeObject> tubes;
  const auto add = [&](const TubeObject& tube) {
    if (std::find(tubes.begin(), tubes.end(), tube) == tubes.end()) tubes.push_back(tube);
  };
  for (const std::string& part : split(text, ';')) {
    if (part.find(':') == std::string::npos) {
      add(parse_tube(part, "--tubes"));
      continue;
    }
    const auto bounds = parse_interval(part, "--tubes", {min_diameter_nm, max_diameter_nm, "nm"});
    TubeFilter filter;
    filter.diameter_nm = Interval{bounds[0], bounds[1]};
    const auto found = candidate_tubes(filter);
    if (found.empty())
      throw InputError(
          {"no tube has a diameter of " + part + " nm", "--tubes", {}, "a wider range", {}});
    for (const Tube& tube : found) add({{tube}});
  }
  std::stable_sort(tubes.begin(), tubes.end(), [](const TubeObject& a, const TubeObject& b) {
    return a.walls.back().radius_nm < b.walls.back().radius_nm;
  });
  return tubes;
}

TableKind read_kind(const Words& words) {
  const bool crossed = words.has("--crossed"), beads = words.flag("--beads");
  if (int(crossed) + int(beads) + int(words.flag("--parallel")) > 1)
    throw InputError({"more than one kind of table",
                      "table",
                      {},
                      "one of --parallel, --crossed and --beads",
                      {}});
  if (words.has("--spacing-nm") && !beads)
    throw InputError({"is for tables of beads", "--spacing-nm", {}, "--beads beside it", {}});
  return crossed ? TableKind::crossed : beads ? TableKind::beads : TableKind::parallel;
}

void read_form(const Words& words, TableJob& job) {
  job.extension = ".csv";
  if (words.flag("--json")) {
    job.form = TableForm::json;
    job.extension = ".json";
  }
  const auto file = words.text("--template");
  if (!file) return;
  if (words.flag("--json"))
    throw InputError(
        {"another form stands beside it, --json", "--template", {}, "one of them", {}});
  job.form = TableForm::layout;
  job.layout = Layout::from_file(*file, job.request.kind);
  std::ifstream stream(*file, std::ios::binary);
  job.layout_text.assign(std::istreambuf_iterator<char>(stream), {});
  // records.dat.template makes files .dat.
  job.extension = std::filesystem::path(*file).stem().extension().string();
  if (job.extension.size() < 2) job.extension = ".txt";
}

void read_objects(const Words& words, TableJob& job) {
  if (const auto range = words.text("--tubes")) {
    if (!words.operands.empty())
      throw InputError({"'" + words.operands.front() + "' stands beside --tubes",
                        "table",
                        {},
                        "two tubes, or --tubes for a series",
                        {}});
    job.series = read_series(*range);
    return;
  }
  if (words.operands.size() != 2)
    throw InputError(
        {std::to_string(words.operands.size()) + " objects",
         "table",
         {},
         "two tubes such as 10,10 17,0, or --tubes RANGE for a series",
         words.operands.size() == 1 ? words.operands[0] + " " + words.operands[0] : ""});
  job.request.first = parse_tube(words.operands[0], "table");
  job.request.second = parse_tube(words.operands[1], "table");
}

// One table goes to standard output or into one file of one form.
void refuse_mixed_places(const Words& words, const TableJob& job) {
  const auto refuse = [](const char* option, const char* other, const char* expected) {
    throw InputError({std::string("stands beside ") + other, option, {}, expected, {}});
  };
  if (job.csv && words.flag("--json") && !words.has("--output"))
    refuse("--csv", "--json", "--json with --output FILE beside --csv FILE");
  if (job.csv && job.output && !words.flag("--json") && !words.has("--template"))
    refuse("--output", "--csv", "one of them; --output is the place of --json or --template");
  if (job.csv && job.output && *job.csv == *job.output)
    refuse("--output", "--csv with the same file", "two files");
  if (job.csv && *job.csv == "-" && words.has("--template") && !words.has("--output"))
    refuse("--csv", "--template, both for standard output", "--output FILE for the template");
}

void read_places(const Words& words, TableJob& job) {
  if (const auto file = words.text("--csv")) job.csv = *file;
  if (const auto file = words.text("--output")) job.output = *file;
  if (job.series.empty()) {
    refuse_mixed_places(words, job);
    if (job.csv && *job.csv != "-") require_file_place(*job.csv);
    if (job.output) require_file_place(*job.output);
    return;
  }
  if (job.csv)
    throw InputError({"one file cannot hold a series",
                      "--csv",
                      {},
                      "--output DIR: a file for each pair, and an index",
                      {}});
  if (!job.output)
    throw InputError(
        {"a series needs a folder for its files", "--tubes", {}, "--output DIR beside it", {}});
}

}  // namespace

std::string option_of(const std::string& member) {
  if (member == "inner_cut_nm") return "--inner-cut-nm";
  if (member == "outer_cut_nm") return "--outer-cut-nm";
  if (member == "angles_deg") return "--crossed";
  if (member == "spacing_nm") return "--spacing-nm";
  if (member == "medium") return "--in";
  return member;
}

TableJob read_table_job(const Words& words) {
  TableJob job;
  TableRequest& request = job.request;
  request.kind = read_kind(words);
  request.angles_deg = read_angles(words);
  request.inner_cut_nm = words.number("--inner-cut-nm", distances);
  request.outer_cut_nm = words.number("--outer-cut-nm", distances);
  request.spacing_nm = words.number("--spacing-nm", {0, 20, "nm"});
  read_objects(words, job);
  if (job.series.empty()) at_table_options([&] { check_request(request); });
  read_form(words, job);
  read_places(words, job);
  return job;
}

}  // namespace gapwright::cli
