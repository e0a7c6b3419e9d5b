#include <cmath>

#include "catch.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/equation/mixture.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

// The files of R-152a and R-123 keep the published MBWR constants beside the Helmholtz form that was integrated from
// them; here the pressure of both forms is compared.
// B. A. Younglove and M. O. McLinden, J. Phys. Chem. Ref. Data 23 (1994) 731; S. L. Outcalt and M. O. McLinden,
// J. Phys. Chem. Ref. Data 25 (1996) 605 (R-152a): p = sum_1^9 a_n rho^n + exp(-(rho/rho_c)^2) sum_10^15 a_n rho^(2n-17).
namespace {

double mbwr_pressure(const data::Mbwr& m, double T, double rho) {
  const auto b = [&](int i) { return m.b[static_cast<std::size_t>(i - 1)]; };
  const double T2 = T * T, T3 = T2 * T, T4 = T3 * T;
  const double a[16] = {0,
                        m.gas_constant * T,
                        b(1) * T + b(2) * std::sqrt(T) + b(3) + b(4) / T + b(5) / T2,
                        b(6) * T + b(7) + b(8) / T + b(9) / T2,
                        b(10) * T + b(11) + b(12) / T,
                        b(13),
                        b(14) / T + b(15) / T2,
                        b(16) / T,
                        b(17) / T + b(18) / T2,
                        b(19) / T2,
                        b(20) / T2 + b(21) / T3,
                        b(22) / T2 + b(23) / T4,
                        b(24) / T2 + b(25) / T3,
                        b(26) / T2 + b(27) / T4,
                        b(28) / T2 + b(29) / T3,
                        b(30) / T2 + b(31) / T3 + b(32) / T4};
  double p = 0;
  for (int n = 1; n <= 9; ++n) p += a[n] * std::pow(rho, n);
  const double x = rho / m.critical_density;
  double q = 0;
  for (int n = 10; n <= 15; ++n) q += a[n] * std::pow(rho, 2 * n - 17);
  return (p + std::exp(-x * x) * q) * 1e5;  // bar
}

}  // namespace

TEST_CASE("the integrated form gives back the published MBWR pressure", "[data]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-152a", "R-123"}) {
    const auto r = refrigerant(name, catalogue);
    const auto& e = *r.components().front().equation;
    REQUIRE(e.mbwr);
    for (const double tr : {0.6, 0.8, 1.0, 1.2})
      for (const double delta : {1e-4, 0.1, 0.5, 1.0, 1.8, 2.4}) {
        const double T = tr * e.reducing_temperature, rho = delta * e.reducing_density;
        // the file's own gas constant (bar L/(mol K)) and critical density (mol/L)
        const double p = mbwr_pressure(*e.mbwr, T, rho * 1e-3);
        INFO(name << " T " << T << " rho " << rho);
        CHECK(r.properties(T, rho).pressure == Approx(p).epsilon(1e-9).margin(1e-9 * rho * 8.314 * T));
      }
  }
}
