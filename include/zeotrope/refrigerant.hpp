#pragma once

#include <Eigen/Core>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/data/records.hpp"
#include "zeotrope/equation/mixture.hpp"
#include "zeotrope/error.hpp"
#include "zeotrope/phase/line.hpp"

namespace zeotrope {

enum class Basis { mass, mole };

/// State in which enthalpy and entropy are set.
/// iir: 200 kJ/kg and 1 kJ/(kg K), saturated liquid at 0 C. ashrae: 0 and 0, saturated liquid at -40 C.
/// normal_boiling_point: 0 and 0, saturated liquid at 101.325 kPa. custom: `enthalpy`, `entropy` at `temperature` and
/// `molar_density`, single phase. The saturated liquid of a blend is its bubble point.
struct ReferenceState {
  enum class Kind { iir, ashrae, normal_boiling_point, custom } kind = Kind::iir;
  double temperature = 0, molar_density = 0;  ///< K, mol/m3; custom only
  double enthalpy = 0, entropy = 0;           ///< J/kg, J/(kg K); custom only
};

/// One phase of an equilibrium. Fractions in the order of Refrigerant::components().
struct Phase {
  double density = 0;        ///< kg/m3
  double molar_density = 0;  ///< mol/m3
  Eigen::VectorXd mole_fractions, mass_fractions;
};

/// A point on the saturation line: pure, bubble or dew.
struct SaturationPoint {
  double temperature = 0;  ///< K
  double pressure = 0;     ///< Pa
  Phase liquid, vapour;
  double fugacity_mismatch = 0;  ///< largest |ln f_i' - ln f_i''| left, checked to be below 1e-9
  bool extrapolated = false;     ///< outside the published range of an equation
};

struct Saturation {
  SaturationPoint bubble, dew;  ///< the same point for a pure fluid
};

/// What to fix: exactly one of temperature (K) and pressure (Pa, absolute).
struct SaturationAt {
  std::optional<double> temperature = std::nullopt;
  std::optional<double> pressure = std::nullopt;
  bool extrapolate = false;  ///< allow states outside the published range; they are marked
};

/// Properties of one phase; mass basis. R. Span, Multiparameter Equations of State (2000), Table 3.8.
struct Properties {
  double temperature, pressure, density;  ///< K, Pa, kg/m3
  double enthalpy, entropy;               ///< J/kg, J/(kg K), in the refrigerant's reference state
  double isochoric_heat_capacity, isobaric_heat_capacity;  ///< J/(kg K)
  double speed_of_sound;                  ///< m/s
};

/// Published range: of a blend the intersection of its components' ranges, with the component that sets each limit.
struct Range {
  double lowest_temperature = 0, highest_temperature = 0;  ///< K
  double highest_pressure = 0;                             ///< Pa
  std::string lowest_set_by, highest_set_by;
};

/// Hot end of the two-phase region.
struct TwoPhaseTop {
  double temperature = 0, pressure = 0;  ///< K, Pa; the critical point, or the hottest point that was reached
  double molar_density = 0;              ///< mol/m3; 0 where `is_critical_point` is false
  bool is_critical_point = true;
  std::string reason;  ///< why no critical point was reached, where so
};

struct Component {
  std::shared_ptr<const data::Compound> compound;
  const data::Equation* equation;  ///< owned by `compound`
  double mole_fraction, mass_fraction;
};

/// A pure fluid or a blend of fixed composition. Immutable, cheap to copy, safe to use from several threads; what is
/// costly (critical point, the traced bubble and dew line) is computed when first asked for and kept.
class Refrigerant {
 public:
  /// For normal use see refrigerant() and blend() below. `fractions` > 0, one per compound; the first equation of each
  /// compound is used.
  Refrigerant(std::string name, std::vector<std::shared_ptr<const data::Compound>> compounds, const std::vector<double>& fractions, Basis basis,
              std::vector<data::Pair> pairs, std::vector<std::shared_ptr<const data::Departure>> departures, std::shared_ptr<const data::Blend> designated = nullptr,
              ReferenceState reference = {});

  /// "R-454B", or the recipe of a blend without designation.
  const std::string& name() const;
  bool is_blend() const { return components().size() > 1; }
  const std::vector<Component>& components() const;
  const Eigen::VectorXd& mole_fractions() const;
  double molar_mass() const;  ///< kg/mol
  /// The designation's record; null for pure fluids and new blends.
  const std::shared_ptr<const data::Blend>& designated() const;
  /// Parameters of each pair (i, j), i < j, row by row, with kind, source and provenance.
  const std::vector<data::Pair>& pairs() const;
  const equation::MultiFluid& model() const;
  const Range& range() const;

  /// Critical point of the equation or of the mixture model; where tracing did not get there, the hottest point reached.
  TwoPhaseTop top() const;
  /// Hottest temperature and highest pressure at which the line exists (cricondentherm, cricondenbar, or critical point).
  double hottest(phase::Line line) const;
  double highest_pressure(phase::Line line) const;

  /// Bubble and dew point at one temperature or one pressure.
  /// BadInput where not exactly one is given or it is not a positive number; OutOfRange outside the published range unless
  /// extrapolating; NoSolution above the two-phase region, saying where that ends; NotConverged otherwise.
  /// Where the bubble point came out below the dew point the liquid is not stable by the model, and that is an error.
  Saturation saturation(const SaturationAt& at) const;
  SaturationPoint bubble(const SaturationAt& at) const;
  SaturationPoint dew(const SaturationAt& at) const;

  /// Dew temperature minus bubble temperature at one pressure, K. 0 for a pure fluid.
  double glide(double pressure, bool extrapolate = false) const;

  /// Properties of a phase from a saturation point, or of any homogeneous state of the whole composition.
  /// BadInput for numbers that are not positive. No check that the state is stable or in range.
  Properties properties(double temperature, double molar_density, const Eigen::VectorXd& mole_fractions) const;
  Properties properties(double temperature, double molar_density) const { return properties(temperature, molar_density, mole_fractions()); }

 private:
  struct Self;
  std::shared_ptr<const Self> self_;
};

/// One component of a recipe.
struct Part {
  std::string compound;
  double fraction;
};

struct BlendOptions {
  Basis basis = Basis::mass;
  ReferenceState reference{};
  bool normalise = false;  ///< scale fractions that do not add to 1 instead of refusing them
};

/// A pure fluid or a designated blend by name: "R-454B", "454b", "propane". BadInput with suggestions where unknown.
/// Reads the coefficient files; keep a Catalogue and pass it where many are made.
Refrigerant refrigerant(std::string_view name, const data::Catalogue& catalogue = data::Catalogue(), ReferenceState reference = {});

/// A blend from a recipe; fractions add to 1 (to 1e-6) unless `normalise`. Components of fraction 0 are dropped, two
/// entries of one compound are an error. Pairs without a row are estimated and marked (PairKind::rule).
Refrigerant blend(const std::vector<Part>& parts, const BlendOptions& options = {}, const data::Catalogue& catalogue = data::Catalogue());

/// Recipe text: "R-32 68.9 + R-1234yf 31.1"; figures add to 100 or to 1. A text without '+' and figures is a name.
std::vector<Part> parse_recipe(std::string_view text, bool normalise = false);

/// A name or a recipe, whichever the text is.
Refrigerant parse_refrigerant(std::string_view text, const BlendOptions& options = {}, const data::Catalogue& catalogue = data::Catalogue());

}  // namespace zeotrope
