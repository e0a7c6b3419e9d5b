#include <fmt/format.h>
#include <pybind11/eigen.h>
#include <pybind11/stl.h>

#include <cmath>
#include <limits>
#include <memory>
#include <optional>
#include <string>
#include <tuple>

#include "bindings.hpp"
#include "zeotrope/data/reader.hpp"
#include "zeotrope/refrigerant.hpp"

/// The numerics under the properties, for tests.
namespace zeotrope::python {

namespace {

using namespace py::literals;
using data::Catalogue;

void positive(const char* what, double value) {
  if (!(std::isfinite(value) && value > 0)) throw BadInput(fmt::format("{}: found {}; a number above 0 is wanted", what, value));
}

Eigen::Matrix4d table(const equation::Derivatives<double>& a) {
  Eigen::Matrix4d t = Eigen::Matrix4d::Constant(std::numeric_limits<double>::quiet_NaN());
  for (int i = 0; i <= equation::max_order; ++i)
    for (int j = 0; i + j <= equation::max_order; ++j) t(i, j) = a(i, j);
  return t;
}

/// A text of several lines is a coefficient file, anything else a name.
Eigen::Matrix4d residual_derivatives(const std::string& compound, std::size_t index, double tau, double delta, const std::optional<Catalogue>& catalogue) {
  positive("tau", tau);
  positive("delta", delta);
  const auto c = compound.find('\n') != std::string::npos ? std::make_shared<const data::Compound>(data::parse_compound(compound, "text"))
                                                          : (catalogue ? *catalogue : Catalogue()).compound(compound);
  if (index >= c->equations.size()) throw BadInput(fmt::format("{}: equation {} of {}", c->designation, index, c->equations.size()));
  return table(equation::evaluate<double>(c->equations[index].residual, tau, delta));
}

using Numbers = Eigen::VectorXd;

void one_each(const Refrigerant& r, const Numbers& values) {
  if (values.size() != r.mole_fractions().size())
    throw BadInput(fmt::format("{}: {} numbers for {} components", r.name(), values.size(), r.mole_fractions().size()));
  for (const double v : values) positive("composition", v);
}

std::tuple<double, Numbers, Eigen::MatrixXd, double, Numbers> helmholtz_density(const Refrigerant& r, double temperature, const Numbers& rho) {
  positive("temperature", temperature);
  one_each(r, rho);
  const auto psi = r.model().helmholtz_density<double>(temperature, rho);
  return {psi.value, psi.gradient, psi.hessian, psi.temperature_derivative, psi.gradient_temperature};
}

Eigen::Matrix4d model_residual(const Refrigerant& r, double temperature, double density, const Numbers& x) {
  positive("temperature", temperature);
  positive("density", density);
  one_each(r, x);
  return table(r.model().residual<double>(temperature, density, x));
}

}  // namespace

void bind_kernel(py::module_& m) {
  m.def("residual_derivatives", &residual_derivatives, "compound"_a, "equation_index"_a, "tau"_a, "delta"_a, "catalogue"_a = py::none(), Unlocked(),
        "4x4 array of delta^i tau^j d^(i+j) alpha_r / d delta^i d tau^j, NaN where i + j > 3.\n\n"
        "`compound` is a name, or the text of a coefficient file.");
  m.def("helmholtz_density", &helmholtz_density, "refrigerant"_a, "temperature"_a, "partial_densities"_a, Unlocked(),
        "Psi = rho alpha_r in mol/m3 at a temperature (K) and partial densities (mol/m3): (value, gradient, hessian, d/dT,\n"
        "d(gradient)/dT).");
  m.def("model_residual", &model_residual, "refrigerant"_a, "temperature"_a, "density"_a, "mole_fractions"_a, Unlocked(),
        "4x4 array as of residual_derivatives, of the mixture model at a temperature (K), a density (mol/m3) and mole fractions.");
}

}  // namespace zeotrope::python
