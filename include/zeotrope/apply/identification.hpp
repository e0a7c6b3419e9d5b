#pragma once

#include <optional>
#include <string>
#include <vector>

#include "zeotrope/refrigerant.hpp"

namespace zeotrope::apply {

/// A global warming potential, or the lack of one. Of a blend: the mass-weighted sum over its components.
struct WarmingPotential {
  std::string report;           ///< "IPCC AR4", "IPCC AR5", "IPCC AR6", "Regulation (EU) 2024/573"
  std::optional<double> value;  ///< nothing: the report gives none for the fluid or for a component ("not given")
  bool below = false;           ///< a pure fluid printed as "<1" there (stored 1); a blend with such a component, counted as 1
};

/// One pair of a blend in words.
struct PairNote {
  std::string first, second;
  data::PairKind kind;
  double gamma_T;
  std::optional<double> gamma_T_uncertainty;
  std::string source, provenance;
};

/// What a refrigerant is and where its figures come from, as a chart shows it.
struct Identification {
  struct Part {
    std::string designation, chemical_name;
    double mass_percent, mole_percent;
    std::optional<double> tolerance_plus, tolerance_minus;  ///< mass percent, designated blends only
    std::string equation, source, provenance;
  };
  std::string name;
  std::vector<Part> parts;
  bool designated = false;   ///< a designated blend or a pure fluid; false: a new blend
  std::string safety_group;  ///< ISO 817 / ASHRAE 34; empty: none assigned, or not known
  double molar_mass = 0;     ///< kg/mol
  std::vector<WarmingPotential> gwp;
  std::optional<double> odp;  ///< Montreal Protocol figure, mass-weighted; nothing where a component's is not given
  std::vector<PairNote> pairs;
  std::vector<std::string> uncertain;  ///< "composition of R-4xx not certain: check the standard" and the like
  Range range;
  TwoPhaseTop top;
};

Identification identify(const Refrigerant& refrigerant);

/// "published", "fitted", "fitted, weakly determined", "estimated", "estimated by rule"
std::string_view in_words(data::PairKind kind);
/// True for the kinds a chart must mark: estimated, and estimated by rule.
bool is_estimated(data::PairKind kind);

}  // namespace zeotrope::apply
