#pragma once

#include <filesystem>
#include <string>
#include <string_view>
#include <vector>

#include "zeotrope/data/records.hpp"

/// Coefficient files -> records. Formats in fluids/README.md. Every fault is a BadFile that names file, line, key,
/// what was found and what would be right: syntax, a missing or unknown key, a wrong type, a row of the wrong length,
/// a number that is not finite or out of its physical range, a duplicate name, percentages that do not add to 100.
/// Files are opened read-only; one of more than 4 MiB is refused.
namespace zeotrope::data {

Compound read_compound(const std::filesystem::path& file);
/// The same from text; `name` stands for the file in messages.
Compound parse_compound(std::string_view text, const std::string& name);

struct PairFile {
  std::vector<Pair> pairs;
  Estimation estimation;
};
PairFile read_pairs(const std::filesystem::path& file);
PairFile parse_pairs(std::string_view text, const std::string& name);

std::vector<Departure> read_departures(const std::filesystem::path& file);
std::vector<Departure> parse_departures(std::string_view text, const std::string& name);

std::vector<Blend> read_blends(const std::filesystem::path& file);
std::vector<Blend> parse_blends(std::string_view text, const std::string& name);

std::vector<Caution> read_cautions(const std::filesystem::path& file);
std::vector<Caution> parse_cautions(std::string_view text, const std::string& name);

}  // namespace zeotrope::data
