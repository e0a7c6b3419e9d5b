#include "catch.hpp"
#include "zeotrope/apply/gauge_reading.hpp"
#include "zeotrope/units.hpp"

using namespace zeotrope;

// ASHRAE Handbook Fundamentals, refrigerant 134a: 292.80 kPa at 0 C (tests/published/saturation_R134a.csv, source ashrae).
TEST_CASE("superheat and subcooling of a pure fluid", "[apply]") {
  const auto r = refrigerant("R-134a");
  const auto suction = apply::gauge_reading(r, 292.80e3, 273.15 + 6);
  CHECK(suction.superheat == Approx(6).margin(0.01));
  CHECK(suction.suction_warning.empty());
  CHECK_FALSE(suction.liquid_warning.empty());
  const auto liquid = apply::gauge_reading(r, 292.80e3, 273.15 - 4);
  CHECK(liquid.subcooling == Approx(4).margin(0.01));
  CHECK(liquid.liquid_warning.empty());
  CHECK_FALSE(liquid.suction_warning.empty());
}

// Common practice, no source: superheat counts from dew, subcooling from bubble; confusing them shifts the result by the glide.
TEST_CASE("a zeotrope takes superheat from dew and subcooling from bubble", "[apply]") {
  const auto r = refrigerant("R-407C");
  const double p = 600e3;
  const auto s = r.saturation({.pressure = p});
  const auto a = apply::gauge_reading(r, p, s.dew.temperature + 5);
  CHECK(a.superheat == Approx(5).margin(1e-9));
  CHECK(a.glide > 5);
  const auto b = apply::gauge_reading(r, p, s.bubble.temperature - 3);
  CHECK(b.subcooling == Approx(3).margin(1e-9));
  // between bubble and dew both warn
  const auto c = apply::gauge_reading(r, p, 0.5 * (s.bubble.temperature + s.dew.temperature));
  CHECK_FALSE(c.suction_warning.empty());
  CHECK_FALSE(c.liquid_warning.empty());
}

TEST_CASE("a gauge at altitude", "[apply]") {
  // the same gauge figure in thinner air is a lower absolute pressure, so a colder saturation temperature
  const auto r = refrigerant("R-134a");
  const auto low = units::parse_pressure("20 psig"), high = units::parse_pressure("20 psig", units::atmosphere_at_altitude(2000));
  CHECK(low - high == Approx(101325 - 79495).margin(15));  // ISO 2533: 79495 Pa at 2000 m
  CHECK(apply::gauge_reading(r, high, 300).dew.temperature < apply::gauge_reading(r, low, 300).dew.temperature - 2);
  CHECK_THROWS_AS(apply::gauge_reading(r, low, -5), BadInput);
  CHECK_THROWS_AS(apply::gauge_reading(r, 6e6, 300), NoSolution);
}
