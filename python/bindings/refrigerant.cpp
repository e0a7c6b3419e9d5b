#include "zeotrope/refrigerant.hpp"

#include <fmt/format.h>
#include <pybind11/eigen.h>
#include <pybind11/stl.h>
#include <pybind11/stl/filesystem.h>

#include <filesystem>
#include <optional>
#include <string>
#include <utility>
#include <vector>

#include "bindings.hpp"
#include "zeotrope/apply/identification.hpp"

namespace zeotrope::python {

namespace {

using namespace py::literals;
using data::Catalogue;

Basis basis_of(const std::string& word) {
  if (word == "mass") return Basis::mass;
  if (word == "mole") return Basis::mole;
  throw BadInput(fmt::format("basis: found \"{}\"; \"mass\" or \"mole\" is wanted", word));
}

ReferenceState reference_of(const std::string& word) {
  using Kind = ReferenceState::Kind;
  if (word == "iir") return {.kind = Kind::iir};
  if (word == "ashrae") return {.kind = Kind::ashrae};
  if (word == "normal boiling point") return {.kind = Kind::normal_boiling_point};
  throw BadInput(fmt::format("reference: found \"{}\"; \"iir\", \"ashrae\" or \"normal boiling point\" is wanted", word));
}

Refrigerant make_blend(const std::vector<std::pair<std::string, double>>& fractions, const Catalogue& catalogue, const std::string& basis, bool normalise,
                       const std::string& reference) {
  std::vector<Part> parts;
  for (const auto& [compound, fraction] : fractions) parts.push_back({compound, fraction});
  return blend(parts, {.basis = basis_of(basis), .reference = reference_of(reference), .normalise = normalise}, catalogue);
}

std::string describe(const Refrigerant& r) {
  if (!r.is_blend()) return fmt::format("<zeotrope.Refrigerant {}: {}>", r.name(), r.components().front().compound->chemical_name);
  if (!r.designated()) return fmt::format("<zeotrope.Refrigerant {}>", r.name());
  std::string parts;
  for (const auto& c : r.components()) parts += fmt::format("{}{} {:.6g}", parts.empty() ? "" : " + ", c.compound->designation, 100 * c.mass_fraction);
  return fmt::format("<zeotrope.Refrigerant {}: {} % by mass>", r.name(), parts);
}

std::string in_brief(const SaturationPoint& p) {
  return fmt::format("{:.6g} K, {:.6g} Pa{}", p.temperature, p.pressure, p.extrapolated ? ", extrapolated" : "");
}

void bind_catalogue(py::module_& m) {
  py::class_<Catalogue>(m, "Catalogue", "Coefficient files of a list of folders, read when first asked for and kept. Safe to use from several threads.")
      .def(py::init<std::vector<std::filesystem::path>>(), "folders"_a, Unlocked())
      .def_static("standard_folders", &Catalogue::standard_folders, "Folders of the environment variable ZEOTROPE_FLUIDS, then the one built with the library.")
      .def_property_readonly("folders", &Catalogue::folders, "Folders in the order in which they are searched; the first that has an entry wins.")
      .def("compounds", &Catalogue::compound_designations, Unlocked(), "Designations of all compounds. Reads every file.")
      .def(
          "blends",
          [](const Catalogue& c) {
            std::vector<std::string> names;
            for (const auto& b : c.blends()) names.push_back(b->designation);
            return names;
          },
          Unlocked(), "Designations of all designated blends.")
      .def("__repr__", [](const Catalogue& c) {
        std::string s;
        for (const auto& f : c.folders()) s += (s.empty() ? "" : ", ") + f.string();
        return fmt::format("<zeotrope.Catalogue of {}>", s);
      });
}

void bind_states(py::module_& m) {
  py::class_<Phase>(m, "Phase", "One phase of an equilibrium; fractions in the order of Refrigerant.components.")
      .def_readonly("density", &Phase::density, "kg/m3")
      .def_readonly("molar_density", &Phase::molar_density, "mol/m3")
      .def_readonly("mole_fractions", &Phase::mole_fractions)
      .def_readonly("mass_fractions", &Phase::mass_fractions)
      .def("__repr__", [](const Phase& p) { return fmt::format("<zeotrope.Phase: {:.6g} kg/m3>", p.density); });

  py::class_<SaturationPoint>(m, "SaturationPoint", "A point on the saturation line: pure, bubble or dew.")
      .def_readonly("temperature", &SaturationPoint::temperature, "K")
      .def_readonly("pressure", &SaturationPoint::pressure, "Pa")
      .def_readonly("liquid", &SaturationPoint::liquid)
      .def_readonly("vapour", &SaturationPoint::vapour)
      .def_readonly("fugacity_mismatch", &SaturationPoint::fugacity_mismatch, "Largest difference of ln(fugacity) between the phases that is left; below 1e-9.")
      .def_readonly("extrapolated", &SaturationPoint::extrapolated, "Outside the published range of an equation.")
      .def("__repr__", [](const SaturationPoint& p) { return fmt::format("<zeotrope.SaturationPoint: {}>", in_brief(p)); });

  py::class_<Saturation>(m, "Saturation", "Bubble and dew point; the same point for a pure fluid.")
      .def_readonly("bubble", &Saturation::bubble)
      .def_readonly("dew", &Saturation::dew)
      .def("__repr__", [](const Saturation& s) { return fmt::format("<zeotrope.Saturation: bubble {}; dew {}>", in_brief(s.bubble), in_brief(s.dew)); });

  py::class_<Properties>(m, "Properties", "Properties of one phase; mass basis. Enthalpy and entropy in the refrigerant's reference state.")
      .def_readonly("temperature", &Properties::temperature, "K")
      .def_readonly("pressure", &Properties::pressure, "Pa")
      .def_readonly("density", &Properties::density, "kg/m3")
      .def_readonly("enthalpy", &Properties::enthalpy, "J/kg")
      .def_readonly("entropy", &Properties::entropy, "J/(kg K)")
      .def_readonly("isochoric_heat_capacity", &Properties::isochoric_heat_capacity, "J/(kg K)")
      .def_readonly("isobaric_heat_capacity", &Properties::isobaric_heat_capacity, "J/(kg K)")
      .def_readonly("speed_of_sound", &Properties::speed_of_sound, "m/s; 0 in a mechanically unstable state")
      .def("__repr__",
           [](const Properties& p) { return fmt::format("<zeotrope.Properties at {:.6g} K, {:.6g} Pa, {:.6g} kg/m3>", p.temperature, p.pressure, p.density); });

  py::class_<Range>(m, "Range", "Published range; of a blend the intersection of its components' ranges.")
      .def_readonly("lowest_temperature", &Range::lowest_temperature, "K")
      .def_readonly("highest_temperature", &Range::highest_temperature, "K")
      .def_readonly("highest_pressure", &Range::highest_pressure, "Pa")
      .def_readonly("lowest_set_by", &Range::lowest_set_by, "The component that sets the lower limit.")
      .def_readonly("highest_set_by", &Range::highest_set_by, "The component that sets the upper limit.")
      .def("__repr__", [](const Range& r) {
        return fmt::format("<zeotrope.Range: {:.6g} K ({}) to {:.6g} K ({}), up to {:.6g} Pa>", r.lowest_temperature, r.lowest_set_by, r.highest_temperature,
                           r.highest_set_by, r.highest_pressure);
      });

  py::class_<TwoPhaseTop>(m, "TwoPhaseTop", "Hot end of the two-phase region.")
      .def_readonly("temperature", &TwoPhaseTop::temperature, "K")
      .def_readonly("pressure", &TwoPhaseTop::pressure, "Pa")
      .def_readonly("molar_density", &TwoPhaseTop::molar_density, "mol/m3; 0 where it is no critical point")
      .def_readonly("is_critical_point", &TwoPhaseTop::is_critical_point)
      .def_readonly("reason", &TwoPhaseTop::reason, "Why no critical point was reached, where so.")
      .def("__repr__", [](const TwoPhaseTop& t) {
        return fmt::format("<zeotrope.TwoPhaseTop: {} {:.6g} K, {:.6g} Pa>", t.is_critical_point ? "critical point" : "hottest point reached", t.temperature,
                           t.pressure);
      });
}

void bind_composition(py::module_& m) {
  py::class_<Component>(m, "Component", "One component of a refrigerant.")
      .def_property_readonly("designation", [](const Component& c) { return c.compound->designation; })
      .def_property_readonly("chemical_name", [](const Component& c) { return c.compound->chemical_name; })
      .def_property_readonly("formula", [](const Component& c) { return c.compound->formula; })
      .def_property_readonly("cas", [](const Component& c) { return c.compound->cas; })
      .def_property_readonly(
          "molar_mass", [](const Component& c) { return c.equation->molar_mass; }, "kg/mol")
      .def_readonly("mole_fraction", &Component::mole_fraction)
      .def_readonly("mass_fraction", &Component::mass_fraction)
      .def_property_readonly(
          "equation", [](const Component& c) { return c.equation->name; }, "Authors and year.")
      .def_property_readonly("source", [](const Component& c) { return c.equation->source; })
      .def_property_readonly(
          "provenance", [](const Component& c) { return c.equation->provenance; }, "Where the coefficients come from and how they were verified.")
      .def("__repr__", [](const Component& c) {
        return fmt::format("<zeotrope.Component {}: {:.6g} by mass, {}>", c.compound->designation, c.mass_fraction, c.equation->name);
      });

  using data::Pair;
  py::class_<Pair>(m, "Pair", "Binary parameters of two components, in the order given: exchanging them turns each beta into 1/beta.")
      .def_readonly("first", &Pair::first)
      .def_readonly("second", &Pair::second)
      .def_property_readonly(
          "kind", [](const Pair& p) { return std::string(apply::in_words(p.kind)); },
          "\"published\", \"fitted\", \"fitted, weakly determined\", \"estimated\" or \"estimated by rule\".")
      .def_property_readonly("estimated", [](const Pair& p) { return apply::is_estimated(p.kind); })
      .def_readonly("beta_T", &Pair::beta_T)
      .def_readonly("gamma_T", &Pair::gamma_T)
      .def_readonly("beta_v", &Pair::beta_v)
      .def_readonly("gamma_v", &Pair::gamma_v)
      .def_readonly("F", &Pair::F)
      .def_readonly("departure", &Pair::departure, "Name of the departure function; \"\" where there is none.")
      .def_readonly("gamma_T_uncertainty", &Pair::gamma_T_uncertainty, "0.01 is about 2 % in bubble pressure at mid composition; None where not known.")
      .def_readonly("source", &Pair::source)
      .def_readonly("provenance", &Pair::provenance)
      .def("__repr__",
           [](const Pair& p) { return fmt::format("<zeotrope.Pair {} / {}: {}, gamma_T {:.6g}>", p.first, p.second, apply::in_words(p.kind), p.gamma_T); });
}

}  // namespace

void bind_refrigerant(py::module_& m) {
  bind_catalogue(m);
  bind_states(m);
  bind_composition(m);

  py::class_<Refrigerant>(m, "Refrigerant",
                          "A pure fluid or a blend of fixed composition. Immutable, safe to use from several threads; made by refrigerant() and blend().")
      .def_property_readonly("name", &Refrigerant::name, "Designation, or the recipe of a blend without one.")
      .def_property_readonly("is_blend", &Refrigerant::is_blend)
      .def_property_readonly("components", &Refrigerant::components)
      .def_property_readonly("pairs", &Refrigerant::pairs, "Binary parameters of the components, row by row: (0, 1), (0, 2), ..., (1, 2), ...")
      .def_property_readonly("mole_fractions", &Refrigerant::mole_fractions)
      .def_property_readonly("molar_mass", &Refrigerant::molar_mass, "kg/mol")
      .def_property_readonly("range", &Refrigerant::range)
      .def_property_readonly(
          "top",
          [](const Refrigerant& r) {
            const py::gil_scoped_release unlocked;
            return r.top();
          },
          "Critical point of the equation or of the mixture model, or the hottest point of the bubble line that was reached.")
      .def(
          "saturation",
          [](const Refrigerant& r, std::optional<double> temperature, std::optional<double> pressure, bool extrapolate) {
            return r.saturation({.temperature = temperature, .pressure = pressure, .extrapolate = extrapolate});
          },
          py::kw_only(), "temperature"_a = py::none(), "pressure"_a = py::none(), "extrapolate"_a = false, Unlocked(),
          "Bubble and dew point at one temperature (K) or one pressure (Pa, absolute).\n\n"
          "BadInput unless exactly one of the two is given and is a positive number; OutOfRange outside the published range\n"
          "(see `range`) unless `extrapolate`, which marks the result; NoSolution above the two-phase region (see `top`);\n"
          "NotConverged where no solution passed its checks.")
      .def("glide", &Refrigerant::glide, py::kw_only(), "pressure"_a, "extrapolate"_a = false, Unlocked(),
           "Dew minus bubble temperature at one pressure (Pa, absolute), K; 0 for a pure fluid. Errors as for saturation().")
      .def(
          "properties",
          [](const Refrigerant& r, double temperature, double molar_density, const std::optional<Eigen::VectorXd>& x) {
            return x ? r.properties(temperature, molar_density, *x) : r.properties(temperature, molar_density);
          },
          py::kw_only(), "temperature"_a, "molar_density"_a, "mole_fractions"_a = py::none(), Unlocked(),
          "Properties of a homogeneous state at a temperature (K) and a density (mol/m3), of the whole composition or of a phase\n"
          "with other mole fractions. BadInput for numbers that are not positive. It is not checked that the state is stable or\n"
          "within the published range.")
      .def("__repr__", &describe);

  m.def(
      "refrigerant",
      [](const std::string& name, const Catalogue& catalogue, const std::string& reference) { return refrigerant(name, catalogue, reference_of(reference)); },
      "name"_a, "catalogue"_a, "reference"_a = "iir", Unlocked(), "See zeotrope.refrigerant.");
  m.def("blend", &make_blend, "fractions"_a, "catalogue"_a, "basis"_a = "mass", "normalise"_a = false, "reference"_a = "iir", Unlocked(),
        "See zeotrope.blend.");
}

}  // namespace zeotrope::python
