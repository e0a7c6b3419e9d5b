#include <cmath>
#include <complex>
#include <map>

#include "catch.hpp"
#include "table.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/data/names.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

// Agreement with an independent evaluator (tests/published/README.md), which shares no code or algebra with the library.

namespace {

/// The equation that a stem of the table names: the default one but for the two that are second in their file.
const data::Equation& equation_of(const data::Compound& c, const std::string& stem) {
  if (stem == "R717_1993")
    for (const auto& e : c.equations)
      if (e.name.find("1993") != std::string::npos) return e;
  if (c.designation == "R-764")
    for (const auto& e : c.equations)
      if ((e.name.find("2006") != std::string::npos) == (stem == "R764_2006")) return e;
  return c.equations.front();
}

/// Scale of the sum of terms: |value| of the largest, so that cancellation is judged fairly.
double largest_term(const data::Terms& t, double tau, double delta) {
  double m = 0;
  const auto see = [&](const data::Terms& one) {
    const auto d = equation::evaluate<double>(one, tau, delta);
    for (int i = 0; i <= 3; ++i)
      for (int j = 0; i + j <= 3; ++j) m = std::max(m, std::abs(d(i, j)));
  };
  const auto each = [&](auto member) {
    for (const auto& row : t.*member) {
      data::Terms one;
      (one.*member).push_back(row);
      see(one);
    }
  };
  each(&data::Terms::power);
  each(&data::Terms::exponential);
  each(&data::Terms::scaled_exponential);
  each(&data::Terms::tau_exponential);
  each(&data::Terms::gaussian);
  each(&data::Terms::reciprocal_gaussian);
  each(&data::Terms::critical_region);
  return m;
}

}  // namespace

TEST_CASE("pure equations agree with the independent evaluator at random states", "[equation]") {
  const data::Catalogue catalogue;
  std::map<std::string, int> seen;
  for (const auto& row : support::published("published/independent_pure_states.csv")) {
    const auto c = catalogue.compound(row.text("designation"));
    const auto& e = equation_of(*c, row.text("equation_file_stem"));
    const double T = *row.number("temperature_K"), rho = *row.number("density_mol_m3");
    const double tau = e.reducing_temperature / T, delta = rho / e.reducing_density;
    INFO(row.text("equation_file_stem") << " at " << T << " K, " << rho << " mol/m3");
    const auto a = equation::evaluate<double>(e.residual, tau, delta);
    const double scale = largest_term(e.residual, tau, delta);
    const auto check = [&](int i, int j, const char* column) {
      const double wanted = std::pow(delta, i) * std::pow(tau, j) * *row.number(column);
      // 1e-9 of the figure itself, and rounding against the largest term
      CHECK(std::abs(a(i, j) - wanted) <= 1e-10 * std::abs(wanted) + 1e-13 * scale);
    };
    check(0, 0, "alphar");
    check(1, 0, "alphar_d");
    check(2, 0, "alphar_dd");
    check(3, 0, "alphar_ddd");
    check(0, 1, "alphar_t");
    check(0, 2, "alphar_tt");
    check(1, 1, "alphar_dt");
    const double p = rho * e.gas_constant * T * (1 + a(1, 0));
    CHECK(p == Approx(*row.number("pressure_Pa")).epsilon(1e-9).margin(1e-12 * scale * rho * e.gas_constant * T));
    if (const auto w = row.number("speed_of_sound_m_s")) {
      auto alone = std::make_shared<data::Compound>(*c);
      alone->equations = {e};
      const Refrigerant r(c->designation, {alone}, {1.0}, Basis::mole, {}, {}, nullptr, {ReferenceState::Kind::custom, e.reducing_temperature, 1.0, 0, 0});
      const auto q = r.properties(T, rho);
      CHECK(q.speed_of_sound == Approx(*w).epsilon(1e-9));
      if (const auto cv = row.number("cv_J_molK")) CHECK(q.isochoric_heat_capacity * e.molar_mass == Approx(*cv).epsilon(1e-9));
      if (const auto cp = row.number("cp_J_molK")) CHECK(q.isobaric_heat_capacity * e.molar_mass == Approx(*cp).epsilon(1e-9));
    }
    ++seen[row.text("equation_file_stem")];
  }
  CHECK(seen.size() == 97);
}

TEST_CASE("mixtures agree with the independent evaluator at random states", "[equation]") {
  const data::Catalogue catalogue;
  std::map<std::string, int> seen;
  for (const auto& row : support::published("published/independent_mixture_random.csv")) {
    const auto fluids = row.texts("fluids");
    const auto x = row.numbers("x");
    std::vector<Part> parts;
    for (std::size_t i = 0; i < fluids.size(); ++i) parts.push_back({fluids[i], x[i]});
    const auto r = blend(parts, {.basis = Basis::mole, .normalise = true}, catalogue);
    const double T = *row.number("temperature_K"), rho = *row.number("density_mol_m3");
    INFO(row.text("blend") << " at " << T << " K, " << rho << " mol/m3");
    const auto psi = r.model().helmholtz_density<double>(T, Eigen::VectorXd(rho * r.mole_fractions()));
    const double alphar = *row.number("alphar"), rt = r.model().gas_constant() * T;
    CHECK(psi.value / rho == Approx(alphar).epsilon(1e-9).margin(1e-13));
    CHECK(r.model().residual<double>(T, rho, r.mole_fractions())(0, 0) == Approx(alphar).epsilon(1e-9).margin(1e-13));
    const double p = rt * (rho + rho * r.mole_fractions().dot(psi.gradient) - psi.value);
    CHECK(p == Approx(*row.number("pressure_Pa")).epsilon(1e-9).margin(1e-9 * rho * rt));
    CHECK(rho * rt * (1 + r.model().residual<double>(T, rho, r.mole_fractions())(1, 0)) == Approx(p).epsilon(1e-9).margin(1e-11 * rho * rt));
    const auto ln_f = row.numbers("ln_f_over_RT");
    for (std::size_t i = 0; i < ln_f.size(); ++i) {
      const auto k = static_cast<Eigen::Index>(i);
      CHECK(std::log(rho * r.mole_fractions()[k]) + psi.gradient[k] == Approx(ln_f[i]).epsilon(1e-9).margin(1e-9));
    }
    ++seen[row.text("blend")];
  }
  CHECK(seen.size() == 25);
}

TEST_CASE("mixture derivatives agree with a complex step and with each other", "[equation]") {
  // analytic gradient and Hessian against a complex step through the same kernel, exact to rounding
  using Complex = std::complex<double>;
  for (const auto* name : {"R-404A", "R-448A", "R-455A", "R-441A"}) {
    const auto r = refrigerant(name);
    const auto n = r.mole_fractions().size();
    for (const double t : {0.7, 0.95, 1.2})
      for (const double d : {0.01, 0.8, 2.3}) {
        const double T = t * r.model().reducing_temperature<double>(r.mole_fractions());
        const Eigen::VectorXd rho = r.mole_fractions() * d * r.model().reducing_density<double>(r.mole_fractions());
        const auto a = r.model().helmholtz_density<double>(T, rho);
        for (Eigen::Index i = 0; i < n; ++i) {
          equation::Vector<Complex> z = rho.cast<Complex>();
          z[i] += Complex(0, 1e-30);
          const auto c = r.model().helmholtz_density<Complex>(Complex(T), z);
          INFO(name << " T " << T << " delta " << d << " component " << i);
          CHECK(c.value.imag() / 1e-30 == Approx(a.gradient[i]).epsilon(1e-11).margin(1e-13));
          for (Eigen::Index k = 0; k < n; ++k) CHECK(c.gradient[k].imag() / 1e-30 == Approx(a.hessian(i, k)).epsilon(1e-9).margin(1e-13 / rho.sum()));
        }
        const auto c = r.model().helmholtz_density<Complex>(Complex(T, 1e-30), rho.cast<Complex>());
        CHECK(c.value.imag() / 1e-30 == Approx(a.temperature_derivative).epsilon(1e-11));
        for (Eigen::Index k = 0; k < n; ++k) CHECK(c.gradient[k].imag() / 1e-30 == Approx(a.gradient_temperature[k]).epsilon(1e-10).margin(1e-14));
      }
  }
}
