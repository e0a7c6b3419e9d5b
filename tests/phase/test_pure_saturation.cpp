#include <cmath>
#include <random>

#include "catch.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

TEST_CASE("pure saturation from the lower limit to the critical point", "[phase]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-12", "R-22", "R-32", "R-125", "R-134a", "R-143a", "R-152a", "R-227ea", "R-290", "R-600a", "R-1234yf", "R-1234ze(E)", "R-717", "R-718", "R-744"}) {
    const auto r = refrigerant(name, catalogue);
    const double low = r.range().lowest_temperature, high = r.top().temperature;
    double last_p = 0, last_l = 1e9, last_v = 0;
    constexpr int n = 400;
    for (int k = 0; k <= n; ++k) {
      const double T = low + (0.9999 * high - low) * k / n;
      INFO(name << " at " << T << " K");
      const auto s = r.bubble({.temperature = T});
      CHECK(s.fugacity_mismatch < 1e-9);
      CHECK(s.pressure > last_p);
      // liquid density falls, but for water below its density maximum at 4 C
      if (std::string(name) != "R-718" || T > 280) CHECK(s.liquid.molar_density < last_l);
      CHECK(s.vapour.molar_density > last_v);
      last_p = s.pressure;
      last_l = s.liquid.molar_density;
      last_v = s.vapour.molar_density;
      // the same pressure from both phases, as far as rounding in a liquid allows
      const auto a = r.properties(T, s.liquid.molar_density), b = r.properties(T, s.vapour.molar_density);
      CHECK(std::abs(a.pressure - b.pressure) <= 1e-9 * b.pressure + 1e-10 * s.liquid.molar_density * 8.314 * T);
    }
    // closes at the critical point: densities join about as (1 - T/Tc)^(1/3) or faster
    for (const double d : {1e-5, 1e-6, 1e-7, 1e-8}) {
      const auto s = r.bubble({.temperature = high * (1 - d)});
      CHECK(s.liquid.molar_density / s.vapour.molar_density - 1 < 12 * std::cbrt(d));
      CHECK(s.pressure < r.top().pressure * (1 + 1e-12));
    }
    CHECK(r.bubble({.temperature = high}).pressure == Approx(r.top().pressure));
  }
}

TEST_CASE("saturation from pressure undoes saturation from temperature", "[phase]") {
  std::mt19937 random(20260101);
  const data::Catalogue catalogue;
  for (const auto* name : {"R-12", "R-32", "R-134a", "R-152a", "R-717", "R-718", "R-744"}) {
    const auto r = refrigerant(name, catalogue);
    std::uniform_real_distribution<double> uniform(r.range().lowest_temperature, 0.9995 * r.top().temperature);
    for (int k = 0; k < 60; ++k) {
      const double T = uniform(random);
      INFO(name << " at " << T << " K");
      CHECK(r.bubble({.pressure = r.bubble({.temperature = T}).pressure}).temperature == Approx(T).epsilon(1e-10));
    }
  }
}

TEST_CASE("Clapeyron: the slope of the saturation line is that of enthalpy over volume", "[phase]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-12", "R-32", "R-125", "R-134a", "R-290", "R-717", "R-718", "R-744"}) {
    const auto r = refrigerant(name, catalogue);
    for (const double t : {0.75, 0.85, 0.95}) {
      const double T = t * r.top().temperature;
      const auto s = r.bubble({.temperature = T});
      const auto l = r.properties(T, s.liquid.molar_density), v = r.properties(T, s.vapour.molar_density);
      const double h = 1e-3 * T;
      const auto p = [&](double x) { return r.bubble({.temperature = x}).pressure; };
      const double slope = (p(T - 2 * h) - 8 * p(T - h) + 8 * p(T + h) - p(T + 2 * h)) / (12 * h);
      INFO(name << " at " << T << " K");
      CHECK((v.enthalpy - l.enthalpy) / (T * (1 / v.density - 1 / l.density)) == Approx(slope).epsilon(2e-8));
      // and Gibbs energies are equal: h - T s
      CHECK(v.enthalpy - T * v.entropy == Approx(l.enthalpy - T * l.entropy).margin(1e-6 * std::abs(v.enthalpy - l.enthalpy)));
    }
  }
}

TEST_CASE("outside the two-phase region the error says where it ends", "[phase]") {
  const auto r = refrigerant("R-134a");
  CHECK_THROWS_AS(r.saturation({.temperature = 380.0}), NoSolution);
  CHECK_THROWS_WITH(r.saturation({.temperature = 380.0}), Catch::Contains("374.21") && Catch::Contains("R-134a"));
  CHECK_THROWS_AS(r.saturation({.pressure = 5e6}), NoSolution);
  CHECK_THROWS_AS(r.saturation({.temperature = 150.0}), OutOfRange);
  CHECK(r.bubble({.temperature = 165.0, .extrapolate = true}).extrapolated);
  CHECK_FALSE(r.bubble({.temperature = 175.0, .extrapolate = true}).extrapolated);
}

TEST_CASE("nonsense in is an error, never a NaN out", "[phase]") {
  const auto r = refrigerant("R-32");
  for (const double bad : {std::nan(""), std::numeric_limits<double>::infinity(), -1.0, 0.0}) {
    CHECK_THROWS_AS(r.saturation({.temperature = bad}), BadInput);
    CHECK_THROWS_AS(r.saturation({.pressure = bad}), BadInput);
    CHECK_THROWS_AS(r.properties(bad, 100.0), BadInput);
    CHECK_THROWS_AS(r.properties(300.0, bad), BadInput);
  }
  CHECK_THROWS_AS(r.saturation({}), BadInput);
  CHECK_THROWS_AS(r.saturation({.temperature = 280.0, .pressure = 1e5}), BadInput);
}
