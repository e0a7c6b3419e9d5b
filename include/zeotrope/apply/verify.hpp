#pragma once

#include <string>
#include <vector>

#include "zeotrope/data/records.hpp"

namespace zeotrope::apply {

/// One figure of a coefficient file's own checks.
struct CheckResult {
  std::string equation, what;  ///< e.g. "saturation pressure at 273.15 K"
  std::string unit;
  double published, computed;
  double deviation;  ///< relative
  double within;     ///< agreement to expect, from the file
  bool passed;
  std::string source, note;
};

/// Computes what a file's check rows publish, for every equation in it: single-phase states, saturation states, the
/// stated critical point (pressure there, and that both density derivatives vanish as far as the file's kind allows), and
/// the normal boiling point. Figures that cannot be computed fail, with the reason in `note`.
std::vector<CheckResult> verify(const data::Compound& compound);

}  // namespace zeotrope::apply
