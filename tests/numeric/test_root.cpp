#include <cmath>

#include "catch.hpp"
#include "zeotrope/numeric/root.hpp"

using zeotrope::numeric::bracketed_root;

TEST_CASE("bracketed root meets closed forms", "[numeric]") {
  const auto cube = bracketed_root([](double x) { return x * x * x - 2; }, 0.0, 4.0);
  REQUIRE(cube.converged);
  CHECK(cube.x == Approx(std::cbrt(2.0)).epsilon(1e-15));
  const auto cosine = bracketed_root([](double x) { return std::cos(x); }, 3.0, 0.0);  // ends in either order
  REQUIRE(cosine.converged);
  CHECK(cosine.x == Approx(std::acos(0.0)).epsilon(1e-15));
  // a function with a flat end, where the secant alone would crawl
  const auto flat = bracketed_root([](double x) { return std::pow(x, 19) - 1e-12; }, 0.0, 10.0);
  REQUIRE(flat.converged);
  CHECK(flat.x == Approx(std::pow(1e-12, 1.0 / 19)).epsilon(1e-10));
}

TEST_CASE("bracketed root says when there is no bracket", "[numeric]") {
  CHECK_FALSE(bracketed_root([](double x) { return x * x + 1; }, -1.0, 1.0).converged);
  CHECK_FALSE(bracketed_root([](double x) { return 1 / x; }, -1.0, std::nan("")).converged);
  CHECK_FALSE(bracketed_root([](double x) { return x < 0.3 ? -1.0 : x > 0.9 ? 1.0 : std::nan(""); }, 0.0, 1.0).converged);
}
