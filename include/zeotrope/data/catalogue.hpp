#pragma once

#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "zeotrope/data/records.hpp"

namespace zeotrope::data {

/// Designations -> records. Holds a list of folders laid out like fluids/ (compounds/*.toml, blends.toml,
/// pairs.toml, departures.toml, cautions.toml; each part optional); the first folder that has an entry wins, so a
/// user's folder comes before the shipped one. Files are read when first asked for and kept. Safe to use from
/// several threads; a copy shares what was read.
class Catalogue {
 public:
  /// `folders` before the standard ones (see standard_folders).
  explicit Catalogue(std::vector<std::filesystem::path> folders = {});

  /// Folders of the environment variable ZEOTROPE_FLUIDS (separated by ':'), then the one installed or built with
  /// the library. BadInput names the variable where it holds a folder that does not exist.
  static std::vector<std::filesystem::path> standard_folders();

  /// Compound by designation, name, alias, formula or CAS number. BadInput with suggestions where there is none,
  /// and with the candidates where a formula or name fits several.
  std::shared_ptr<const Compound> compound(std::string_view name) const;
  std::shared_ptr<const Compound> find_compound(std::string_view name) const;
  /// Designated blend; null where there is none.
  std::shared_ptr<const Blend> find_blend(std::string_view designation) const;
  /// The row for two designations in either order, turned so that `first` is the first asked for (beta -> 1/beta
  /// on exchange); nothing where no folder has one.
  std::optional<Pair> find_pair(std::string_view first, std::string_view second) const;
  /// Owned by the catalogue; null where unknown.
  std::shared_ptr<const Departure> find_departure(std::string_view name) const;
  const Estimation& estimation() const;
  const std::vector<Caution>& cautions() const;

  std::vector<std::string> compound_designations() const;
  std::vector<std::shared_ptr<const Blend>> blends() const;
  /// Names near to a misspelt one, compounds and blends.
  std::vector<std::string> suggestions(std::string_view name) const;

  const std::vector<std::filesystem::path>& folders() const;

 private:
  struct Shelf;
  std::shared_ptr<Shelf> shelf_;
};

}  // namespace zeotrope::data
