#include <thread>

#include "catch.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

TEST_CASE("reference states", "[refrigerant]") {
  const data::Catalogue catalogue;
  // by definition: IIR 200 kJ/kg and 1 kJ/(kg K) at 0 C, ASHRAE 0 and 0 at -40 C, saturated liquid (bubble point)
  for (const auto* name : {"R-134a", "R-32", "R-410A", "R-454B"}) {
    const auto at = [&](ReferenceState::Kind kind, const SaturationAt& where) {
      const auto r = refrigerant(name, catalogue, {kind});
      const auto s = r.bubble(where);
      return r.properties(s.temperature, s.liquid.molar_density);
    };
    INFO(name);
    const auto iir = at(ReferenceState::Kind::iir, {.temperature = 273.15});
    CHECK(iir.enthalpy == Approx(200e3).epsilon(1e-12));
    CHECK(iir.entropy == Approx(1e3).epsilon(1e-12));
    const auto ashrae = at(ReferenceState::Kind::ashrae, {.temperature = 233.15});
    CHECK(ashrae.enthalpy == Approx(0).margin(1e-6));
    CHECK(ashrae.entropy == Approx(0).margin(1e-8));
    const auto nbp = at(ReferenceState::Kind::normal_boiling_point, {.pressure = 101325.0});
    CHECK(nbp.enthalpy == Approx(0).margin(1e-6));
    CHECK(nbp.entropy == Approx(0).margin(1e-8));
  }
  const auto own = refrigerant("R-134a", catalogue, {ReferenceState::Kind::custom, 300.0, 50.0, 5.0, 7.0});
  CHECK(own.properties(300.0, 50.0).enthalpy == Approx(5).margin(1e-6));
  CHECK(own.properties(300.0, 50.0).entropy == Approx(7).margin(1e-8));
}

TEST_CASE("two references differ by a constant", "[refrigerant]") {
  const data::Catalogue catalogue;
  const auto a = refrigerant("R-404A", catalogue), b = refrigerant("R-404A", catalogue, {ReferenceState::Kind::ashrae});
  const double d = a.properties(250, 30).enthalpy - b.properties(250, 30).enthalpy;
  CHECK(a.properties(320, 9000).enthalpy - b.properties(320, 9000).enthalpy == Approx(d).epsilon(1e-11));
}

TEST_CASE("recipes", "[refrigerant]") {
  const auto parts = parse_recipe("R-32 68.9 + R-1234yf 31.1");
  REQUIRE(parts.size() == 2);
  CHECK(parts[0].compound == "R-32");
  CHECK(parts[0].fraction == Approx(0.689));
  CHECK(parse_recipe("carbon dioxide 0.1+propane 0.9")[0].compound == "carbon dioxide");
  CHECK(parse_recipe("R-32 68.9% + R-1234yf 31.1%")[1].fraction == Approx(0.311));
  CHECK(parse_recipe("R-32 1 + R-125 1", true)[0].fraction == Approx(0.5));
  CHECK_THROWS_WITH(parse_recipe("R-32 60 + R-125 30"), Catch::Contains("add to 90") && Catch::Contains("100"));
  CHECK_THROWS_AS(parse_recipe("R-32 + R-125 50"), BadInput);
  CHECK_THROWS_AS(parse_recipe("R-32 50 + "), BadInput);
  CHECK_THROWS_AS(parse_recipe("R-32 -50 + R-125 150"), BadInput);
  CHECK_THROWS_AS(parse_recipe("R-32 nan + R-125 50"), BadInput);
  CHECK_THROWS_AS(parse_recipe(""), BadInput);
  // a recipe that is a designation computes the same
  const data::Catalogue catalogue;
  const auto named = refrigerant("R-454B", catalogue), made = parse_refrigerant("R-32 68.9 + R-1234yf 31.1", {}, catalogue);
  CHECK(made.bubble({.temperature = 280}).pressure == named.bubble({.temperature = 280}).pressure);
  CHECK(made.designated() == nullptr);
}

TEST_CASE("bad compositions", "[refrigerant]") {
  const data::Catalogue catalogue;
  CHECK_THROWS_AS(blend({}, {}, catalogue), BadInput);
  CHECK_THROWS_AS(blend({{"R-32", 0.5}, {"R-125", 0.4}}, {}, catalogue), BadInput);
  CHECK_THROWS_AS(blend({{"R-32", 0.5}, {"r32", 0.5}}, {}, catalogue), BadInput);
  CHECK_THROWS_AS(blend({{"R-32", -0.5}, {"R-125", 1.5}}, {}, catalogue), BadInput);
  CHECK_THROWS_AS(blend({{"R-32", std::nan("")}, {"R-125", 0.5}}, {}, catalogue), BadInput);
  CHECK_THROWS_AS(blend({{"R-32", 0.0}, {"R-125", 0.0}}, {.normalise = true}, catalogue), BadInput);
  CHECK_THROWS_WITH(blend({{"R-32", 0.5}, {"R-1132a", 0.5}}, {}, catalogue), Catch::Contains("R-1132a") && Catch::Contains("no Helmholtz equation"));
}

TEST_CASE("one refrigerant in many threads", "[refrigerant]") {
  const data::Catalogue catalogue;
  const auto shared = refrigerant("R-407C", catalogue);
  const double alone = refrigerant("R-407C", catalogue).bubble({.temperature = 290.0}).pressure;
  std::vector<double> results(8);
  std::vector<std::thread> threads;
  for (std::size_t k = 0; k < results.size(); ++k)
    threads.emplace_back([&, k] {
      for (int i = 0; i < 20; ++i) results[k] = shared.bubble({.temperature = 290.0}).pressure;
    });
  for (auto& t : threads) t.join();
  for (const double p : results) CHECK(p == alone);
}
