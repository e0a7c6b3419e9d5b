#include "catch.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/equation/pair_rule.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

TEST_CASE("classes are read off formula and number", "[equation]") {
  const data::Catalogue c;
  const auto kind = [&](const char* name) { return equation::compound_class(*c.compound(name)); };
  CHECK(kind("R-290") == "hydrocarbon");
  CHECK(kind("R-1270") == "hydrocarbon");
  CHECK(kind("R-32") == "hydrofluorocarbon");
  CHECK(kind("R-227ea") == "hydrofluorocarbon");
  CHECK(kind("R-22") == "hydrochlorofluorocarbon");
  CHECK(kind("R-12") == "chlorofluorocarbon");
  CHECK(kind("R-218") == "perfluorocarbon");
  CHECK(kind("R-1234yf") == "hydrofluoroolefin");
  CHECK(kind("R-744").empty());
  CHECK(kind("R-717").empty());
}

TEST_CASE("a pair without a row is estimated by its class and marked", "[equation]") {
  const data::Catalogue catalogue;
  REQUIRE_FALSE(catalogue.find_pair("R-32", "R-1270"));
  const auto r = blend({{"R-32", 0.9}, {"R-1270", 0.1}}, {}, catalogue);
  REQUIRE(r.pairs().size() == 1);
  CHECK(r.pairs()[0].kind == data::PairKind::rule);
  CHECK(r.pairs()[0].gamma_T == 0.86);  // class value of fluids/pairs.toml: hydrocarbon with R-32
  CHECK(r.pairs()[0].gamma_T_uncertainty.value() == 0.01);
  // no class: geometric mean
  const auto other = blend({{"R-717", 0.5}, {"R-290", 0.5}}, {}, catalogue);
  CHECK(other.pairs()[0].kind == data::PairKind::rule);
  CHECK(other.pairs()[0].gamma_T == 1.0);
  CHECK_FALSE(other.pairs()[0].gamma_T_uncertainty);
}

TEST_CASE("the half-way rule gives the gamma_v of the rows that name it", "[equation]") {
  // fluids/pairs.toml: rows fitted with gamma_v by rule print it to 6 digits
  const data::Catalogue c;
  for (const auto& [a, b] : {std::pair{"R-32", "R-1234yf"}, {"R-134a", "R-1234ze(E)"}, {"R-744", "R-32"}, {"R-125", "R-600a"}}) {
    const auto A = c.compound(a), B = c.compound(b);
    const auto rule = equation::estimated_pair(c.estimation(), *A, *B, A->equations.front().reducing_density, B->equations.front().reducing_density);
    CHECK(rule.gamma_v == Approx(c.find_pair(a, b)->gamma_v).epsilon(1e-6));
  }
}

// E. W. Lemmon and R. T Jacobsen, J. Phys. Chem. Ref. Data 33 (2004) 593: the rows carry zeta and xi as published; the
// identity gamma_T = (Ti + Tj + zeta)/(2 sqrt(Ti Tj)) and its like for gamma_v must give the other columns.
TEST_CASE("published zeta and xi give gamma_T and gamma_v", "[equation]") {
  const data::Catalogue c;
  int seen = 0;
  for (const auto& [a, b] : {std::pair{"R-32", "R-125"}, {"R-32", "R-134a"}, {"R-125", "R-134a"}, {"R-125", "R-143a"}, {"R-134a", "R-143a"}, {"R-134a", "R-152a"}}) {
    const auto p = c.find_pair(a, b);
    REQUIRE(p);
    REQUIRE((p->zeta && p->xi));
    const auto& A = c.compound(a)->equations.front();
    const auto& B = c.compound(b)->equations.front();
    const double Ti = A.reducing_temperature, Tj = B.reducing_temperature, vi = 1 / A.reducing_density, vj = 1 / B.reducing_density;
    CHECK(p->gamma_T == Approx((Ti + Tj + *p->zeta) / (2 * std::sqrt(Ti * Tj))).epsilon(1e-9));
    CHECK(p->gamma_v == Approx(4 * (vi + vj + *p->xi * 1e-3) / std::pow(std::cbrt(vi) + std::cbrt(vj), 3)).epsilon(1e-9));
    ++seen;
  }
  CHECK(seen == 6);
}
