#include <boost/multiprecision/cpp_dec_float.hpp>
#include <algorithm>
#include <cmath>
#include <map>
#include <string>

#include "catch.hpp"
#include "table.hpp"
#include "zeotrope/equation/residual.hpp"

using namespace zeotrope;
using Digits50 = boost::multiprecision::number<boost::multiprecision::cpp_dec_float<60>, boost::multiprecision::et_off>;

// Every derivative of every kind of term against mpmath, 32 digits: tests/equation/term_derivatives.csv, made by
// tests/tools/make_term_table.py from the formulas alone. The kernel is run in 60 digits, so that agreement to 28 digits
// proves the algebra, and in double, which gives its rounding.

namespace {

template <std::size_t N>
void put(data::Rows<N>& rows, const std::vector<double>& v) {
  REQUIRE(v.size() == N);
  auto& row = rows.emplace_back();
  std::copy(v.begin(), v.end(), row.begin());
}

data::Terms one(const std::string& kind, const std::vector<double>& v) {
  data::Terms t;
  if (kind == "power") put(t.power, v);
  else if (kind == "exponential") put(t.exponential, v);
  else if (kind == "scaled_exponential") put(t.scaled_exponential, v);
  else if (kind == "tau_exponential") put(t.tau_exponential, v);
  else if (kind == "gaussian") put(t.gaussian, v);
  else if (kind == "reciprocal_gaussian") put(t.reciprocal_gaussian, v);
  else if (kind == "delta_gaussian") put(t.delta_gaussian, v);
  else if (kind == "critical_region") put(t.critical_region, v);
  else FAIL("kind " << kind);
  return t;
}

}  // namespace

TEST_CASE("every derivative of every kind of term against mpmath", "[equation]") {
  std::map<std::string, int> seen;
  for (const auto& row : support::published("equation/term_derivatives.csv")) {
    const auto kind = row.text("kind");
    const auto terms = one(kind, row.numbers("row"));
    const double tau = *row.number("tau"), delta = *row.number("delta");
    const int i = static_cast<int>(*row.number("i")), j = static_cast<int>(*row.number("j"));
    const Digits50 wanted(row.text("value"));
    const auto exact = equation::evaluate<Digits50>(terms, Digits50(tau), Digits50(delta));
    INFO(kind << " " << row.text("row") << " tau " << tau << " delta " << delta << " d" << i << j);
    // against the largest derivative at the point: some vanish exactly
    Digits50 scale = abs(wanted);
    double double_scale = std::abs(static_cast<double>(wanted));
    const auto rounded = equation::evaluate<double>(terms, tau, delta);
    for (int k = 0; k <= 3; ++k)
      for (int m = 0; k + m <= 3; ++m) {
        if (abs(exact(k, m)) > scale) scale = abs(exact(k, m));
        double_scale = std::max(double_scale, std::abs(rounded(k, m)));
      }
    CHECK(abs(exact(i, j) - wanted) <= scale * Digits50("1e-28"));
    CHECK(std::abs(rounded(i, j) - static_cast<double>(wanted)) <= 2e-13 * double_scale);
    ++seen[kind];
  }
  CHECK(seen.size() == 8);
  for (const auto& [kind, count] : seen) CHECK(count >= 10);
}

TEST_CASE("long double and double agree", "[equation]") {
  data::Terms t;
  t.exponential = {{0.7, 1.5, 3, 2}};
  t.gaussian = {{-0.3, 2.5, 1, 0.8, 1.1, 1.7, 0.4}};
  const auto a = equation::evaluate<double>(t, 1.1, 0.9);
  const auto b = equation::evaluate<long double>(t, 1.1L, 0.9L);
  for (int i = 0; i <= 3; ++i)
    for (int j = 0; i + j <= 3; ++j) CHECK(a(i, j) == Approx(static_cast<double>(b(i, j))).epsilon(1e-13));
}
