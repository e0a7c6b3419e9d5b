#include "catch.hpp"
#include "zeotrope/units.hpp"

using namespace zeotrope;
using units::Pressure;
using units::Temperature;

TEST_CASE("pressure units against NIST SP 811 (2008), appendix B", "[units]") {
  CHECK(units::to_pascal(1, Pressure::psia) == Approx(6894.757).epsilon(1e-7));
  CHECK(units::to_pascal(1, Pressure::bar_absolute) == 1e5);
  CHECK(units::to_pascal(0, Pressure::psig) == 101325.0);
  CHECK(units::standard_atmosphere / units::psi == Approx(14.69595).epsilon(1e-6));
  CHECK(units::standard_atmosphere / units::inch_of_mercury == Approx(29.9213).epsilon(2e-6));
  CHECK(units::to_pascal(1, Pressure::kgf_cm2_gauge) - 101325.0 == Approx(98066.5));
}

TEST_CASE("vacuum counts downward from the ambient pressure", "[units]") {
  CHECK(units::to_pascal(0, Pressure::inhg_vacuum) == 101325.0);
  CHECK(units::to_pascal(29.92, Pressure::inhg_vacuum) == Approx(4).margin(5));
  CHECK_THROWS_AS(units::to_pascal(30.5, Pressure::inhg_vacuum), BadInput);
  CHECK(units::from_pascal(101325.0 - 10 * units::inch_of_mercury, Pressure::inhg_vacuum) == Approx(10));
}

TEST_CASE("every unit goes there and back", "[units]") {
  for (const auto& u : units::pressure_units)
    for (const double p : {5e3, 101325.0, 1e6}) CHECK(units::to_pascal(units::from_pascal(p, u.id, 84e3), u.id, 84e3) == Approx(p).epsilon(1e-13));
  for (const auto u : {Temperature::kelvin, Temperature::celsius, Temperature::fahrenheit}) CHECK(units::to_kelvin(units::from_kelvin(254.3, u), u) == Approx(254.3).epsilon(1e-14));
  CHECK(units::difference_to_kelvin(units::difference_from_kelvin(6.5, Temperature::fahrenheit), Temperature::fahrenheit) == Approx(6.5));
}

TEST_CASE("temperature scales", "[units]") {
  CHECK(units::to_kelvin(-40, Temperature::fahrenheit) == Approx(233.15));  // the one reading both scales share
  CHECK(units::to_kelvin(-40, Temperature::celsius) == Approx(233.15));
  CHECK(units::difference_from_kelvin(5, Temperature::fahrenheit) == Approx(9));  // no offset of 32
  CHECK_THROWS_AS(units::to_kelvin(-300, Temperature::celsius), BadInput);
}

// ISO 2533:1975 (ICAO standard atmosphere), table 1: pressure at altitude, kPa (from memory)
TEST_CASE("standard atmosphere", "[units]") {
  CHECK(units::atmosphere_at_altitude(0) == 101325.0);
  CHECK(units::atmosphere_at_altitude(500) == Approx(95461).epsilon(1e-4));
  CHECK(units::atmosphere_at_altitude(1000) == Approx(89874).epsilon(1e-4));
  CHECK(units::atmosphere_at_altitude(2000) == Approx(79495).epsilon(1e-4));
  CHECK(units::atmosphere_at_altitude(11000) == Approx(22632).epsilon(3e-4));
  CHECK_THROWS_AS(units::atmosphere_at_altitude(12000), BadInput);
  CHECK_THROWS_AS(units::atmosphere_at_altitude(std::nan("")), BadInput);
}

TEST_CASE("quantities are read with their unit", "[units]") {
  CHECK(units::parse_pressure("118 psig") == Approx(118 * units::psi + 101325));
  CHECK(units::parse_pressure("-0.35bar(g)") == Approx(66325));
  CHECK(units::parse_pressure("12 inHg") == Approx(101325 - 12 * 3386.389));
  CHECK(units::parse_pressure("450 kPa") == Approx(450e3));
  CHECK(units::parse_temperature("21.5C") == Approx(294.65));
  CHECK(units::parse_temperature("70 \u00b0F") == Approx(294.2611).epsilon(1e-6));
  CHECK(units::parse_temperature("+293.15 K") == Approx(293.15));
  CHECK(units::parse_temperature_difference("9F") == Approx(5));
}

TEST_CASE("bad quantities say what would be right", "[units]") {
  CHECK_THROWS_WITH(units::parse_pressure("118 psi"), Catch::Contains("psig or psia"));
  CHECK_THROWS_WITH(units::parse_pressure("3 bar"), Catch::Contains("bar(g) or bar(a)"));
  CHECK_THROWS_WITH(units::parse_pressure("3 furlong"), Catch::Contains("furlong"));
  CHECK_THROWS_AS(units::parse_pressure("psig"), BadInput);
  CHECK_THROWS_AS(units::parse_pressure(""), BadInput);
  CHECK_THROWS_AS(units::parse_pressure("-200 bar(a)"), BadInput);
  CHECK_THROWS_AS(units::parse_pressure("nan psig"), BadInput);
  CHECK_THROWS_AS(units::parse_pressure("inf psig"), BadInput);
  CHECK_THROWS_AS(units::parse_pressure("1e999 psig"), BadInput);
  CHECK_THROWS_WITH(units::parse_temperature("20"), Catch::Contains("without a unit"));
  CHECK_THROWS_WITH(units::parse_temperature("20 X"), Catch::Contains("K, C or F"));
  CHECK_THROWS_AS(units::parse_temperature("-500C"), BadInput);
}
