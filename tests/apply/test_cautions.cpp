#include <algorithm>
#include <set>

#include "catch.hpp"
#include "zeotrope/apply/cautions.hpp"
#include "zeotrope/apply/identification.hpp"

using namespace zeotrope;

namespace {

std::set<std::string> conditions(const Refrigerant& r, const data::Catalogue& catalogue, bool below = false, bool critical = false) {
  std::set<std::string> s;
  for (const auto& c : apply::applicable_cautions(r, catalogue, below, critical)) s.insert(c.when);
  return s;
}

}  // namespace

TEST_CASE("cautions follow the fluid", "[apply]") {
  const data::Catalogue c;
  const auto of = [&](const char* name) { return conditions(refrigerant(name, c), c); };
  for (const auto* name : {"R-134a", "R-454B", "R-744", "R-717", "R-290"}) CHECK(of(name).contains("always"));
  CHECK(of("R-454B").contains("zeotrope"));
  CHECK(of("R-454B").contains("flammable"));
  CHECK(of("R-454B").contains("high-pressure"));  // stands near 40 bar(g) at 65 C
  CHECK_FALSE(of("R-134a").contains("zeotrope"));
  CHECK_FALSE(of("R-134a").contains("flammable"));
  CHECK_FALSE(of("R-134a").contains("high-pressure"));
  CHECK(of("R-134a").contains("non-flammable-halogenated"));
  CHECK(of("R-744").contains("carbon-dioxide"));
  CHECK(of("R-455A").contains("carbon-dioxide"));
  CHECK(of("R-717").contains("ammonia"));
  CHECK(of("R-717").contains("toxic"));
  CHECK(of("R-290").contains("flammable"));
  CHECK(of("R-12").contains("phased-out"));
  CHECK(conditions(refrigerant("R-134a", c), c, true, false).contains("below-atmosphere"));
  CHECK(conditions(refrigerant("R-134a", c), c, false, true).contains("near-critical"));
}

TEST_CASE("cautions without a group, for azeotropes and for common pressures", "[apply]") {
  const data::Catalogue c;
  const auto of = [&](const char* name) { return conditions(refrigerant(name, c), c); };
  for (const auto* name : {"R-161", "R-41", "R-600", "cyclopentane", "hydrogen sulphide"}) CHECK(of(name).contains("flammable"));
  CHECK_FALSE(of("R-161").contains("non-flammable-halogenated"));
  CHECK_FALSE(of("R-507A").contains("zeotrope"));
  CHECK(of("R-407C").contains("zeotrope"));
  // common practice, no source: R-404A and R-407C are serviced with the sets of R-22, R-410A is not
  for (const auto* name : {"R-22", "R-404A", "R-407C"}) CHECK_FALSE(of(name).contains("high-pressure"));
  for (const auto* name : {"R-410A", "R-32", "R-744"}) CHECK(of(name).contains("high-pressure"));
}

TEST_CASE("a new blend is never given a safety group", "[apply]") {
  const data::Catalogue c;
  const auto r = blend({{"R-32", 0.7}, {"R-1234yf", 0.3}}, {}, c);
  CHECK(apply::identify(r).safety_group.empty());
  CHECK_FALSE(apply::identify(r).designated);
  CHECK(conditions(r, c).contains("unclassified"));
  CHECK(conditions(r, c).contains("flammable"));  // a component is
  const auto named = apply::identify(refrigerant("R-454B", c));
  CHECK(named.safety_group == "A2L");
}

// Published blend figures: IPCC AR4 values in the tables of regulators and makers, from memory (R-410A 2088, R-454B 466,
// R-404A 3922); IPCC AR6 (R-410A 2256, R-454B 531).
TEST_CASE("warming potential of a blend is the mass-weighted sum", "[apply]") {
  const data::Catalogue c;
  const auto gwp = [&](const char* name, std::size_t report) { return apply::identify(refrigerant(name, c)).gwp.at(report).value; };
  CHECK(*gwp("R-410A", 0) == Approx(2088).margin(1));
  CHECK(*gwp("R-454B", 0) == Approx(466).margin(1));
  CHECK(*gwp("R-404A", 0) == Approx(3922).margin(1));
  CHECK(*gwp("R-410A", 2) == Approx(2256).margin(1));
  CHECK(*gwp("R-454B", 2) == Approx(531).margin(1));
  CHECK(apply::identify(refrigerant("R-454B", c)).gwp[1].below);  // AR5 prints R-1234yf as <1
}
