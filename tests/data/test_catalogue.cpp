#include <cstdlib>
#include <filesystem>
#include <fstream>

#include "catch.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/error.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

TEST_CASE("compounds are found by designation, name, alias, formula and CAS number", "[data]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-744", "r744", "744", "carbon dioxide", "CO2", "124-38-9"}) CHECK(catalogue.compound(name)->designation == "R-744");
  CHECK(catalogue.compound("propane")->designation == "R-290");
  CHECK(catalogue.find_compound("R-9999") == nullptr);
  CHECK(catalogue.find_blend("454b")->designation == "R-454B");
}

TEST_CASE("a name that fits several compounds is refused with the candidates", "[data]") {
  const data::Catalogue catalogue;
  CHECK_THROWS_WITH(catalogue.compound("CHF=CHCF3"), Catch::Contains("R-1234ze(E)") && Catch::Contains("R-1234ze(Z)"));
  CHECK_THROWS_WITH(blend({{"R-410A", 0.5}, {"R-134a", 0.5}}, {}, catalogue), Catch::Contains("R-410A is a blend"));
}

TEST_CASE("an unknown name is answered with near ones", "[data]") {
  CHECK_THROWS_WITH(refrigerant("R-454X"), Catch::Contains("R-454X") && Catch::Contains("R-454B"));
  CHECK_THROWS_AS(refrigerant(""), BadInput);
  CHECK_THROWS_AS(refrigerant("../R-32"), BadInput);  // never a path
  CHECK_THROWS_AS(refrigerant("/etc/passwd"), BadInput);
}

TEST_CASE("a pair turned around gives the same model", "[data]") {
  const data::Catalogue catalogue;
  const auto ab = catalogue.find_pair("R-744", "R-290"), ba = catalogue.find_pair("R-290", "R-744");
  REQUIRE(ab);
  REQUIRE(ba);
  CHECK(ab->beta_T * ba->beta_T == Approx(1).epsilon(1e-15));
  const auto one = blend({{"R-744", 0.3}, {"R-290", 0.7}}, {}, catalogue), other = blend({{"R-290", 0.7}, {"R-744", 0.3}}, {}, catalogue);
  CHECK(one.bubble({.temperature = 260.0}).pressure == Approx(other.bubble({.temperature = 260.0}).pressure).epsilon(1e-11));
}

TEST_CASE("a user's folder comes before the shipped one", "[data]") {
  namespace fs = std::filesystem;
  const auto folder = fs::temp_directory_path() / "zeotrope-test-catalogue";
  fs::remove_all(folder);
  fs::create_directories(folder / "compounds");
  std::ofstream(folder / "blends.toml") << "[[blend]]\ndesignation = \"R-454B\"\ncomponents = [\"R-32\", \"R-1234yf\"]\nmass_percent = [60.0, 40.0]\n";
  const data::Catalogue catalogue({folder});
  CHECK(catalogue.find_blend("R-454B")->mass_percent[0] == 60.0);
  CHECK(catalogue.find_blend("R-410A")->mass_percent[0] == 50.0);
  fs::remove_all(folder);
  CHECK_THROWS_AS(data::Catalogue({folder}), BadInput);
}

TEST_CASE("every shipped file reads and every name in it resolves", "[data]") {
  const data::Catalogue catalogue;
  const auto names = catalogue.compound_designations();
  CHECK(names.size() >= 150);
  for (const auto& b : catalogue.blends())
    for (const auto& c : b->components) CHECK(catalogue.find_compound(c) != nullptr);
  CHECK_FALSE(catalogue.cautions().empty());
}
