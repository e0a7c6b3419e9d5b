#include <cmath>

#include "catch.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/equation/ideal_gas.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

TEST_CASE("enthalpy and entropy of the ideal gas differentiate to its heat capacity", "[equation]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-32", "R-134a", "R-152a", "R-718", "R-717", "R-125", "R-702"}) {
    const auto& gas = catalogue.compound(name)->equations.front().ideal_gas;
    for (const double T : {180.0, 273.15, 450.0}) {
      // five-point stencil: error of order h^4, far below the tolerance
      const auto slope = [&](auto pick) {
        const double h = 0.05;
        const auto f = [&](double x) { return pick(equation::evaluate<long double>(gas, static_cast<long double>(x))); };
        return static_cast<double>((f(T - 2 * h) - 8 * f(T - h) + 8 * f(T + h) - f(T + 2 * h)) / (12 * h));
      };
      const double cp = equation::evaluate<double>(gas, T).heat_capacity;
      INFO(name << " at " << T << " K");
      CHECK(slope([](const auto& v) { return v.enthalpy; }) == Approx(cp).epsilon(1e-9));
      CHECK(slope([](const auto& v) { return v.entropy; }) == Approx(cp / T).epsilon(1e-9));
    }
  }
}

TEST_CASE("power terms with exponents 0 and -1 integrate to logarithms", "[equation]") {
  const data::IdealGas gas{"", 0.0, {{2.0, 0.0}, {3.0, -1.0}}, {}};
  const auto a = equation::evaluate<double>(gas, 200.0), b = equation::evaluate<double>(gas, 300.0);
  CHECK(a.heat_capacity == Approx(2 + 3.0 / 200));
  CHECK(b.enthalpy - a.enthalpy == Approx(2 * 100 + 3 * std::log(1.5)));
  CHECK(b.entropy - a.entropy == Approx(2 * std::log(1.5) - 3 * (1 / 300.0 - 1 / 200.0)));
}
