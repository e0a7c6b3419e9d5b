#include <cmath>

#include "catch.hpp"
#include "table.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/phase/critical_point.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

TEST_CASE("the stated critical point of a pure equation is found on the equation itself", "[phase]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-12", "R-22", "R-32", "R-125", "R-134a", "R-143a", "R-152a", "R-227ea", "R-290", "R-600a", "R-1234yf", "R-1234ze(E)", "R-717", "R-718", "R-744"}) {
    const auto r = refrigerant(name, catalogue);
    const auto& stated = r.components().front().equation->critical_point;
    INFO(name << " " << r.components().front().equation->source);
    CHECK(r.top().temperature == Approx(stated.temperature).epsilon(2e-5));
    CHECK(r.top().pressure == Approx(stated.pressure).epsilon(4e-4));
    CHECK(r.top().molar_density == Approx(stated.density).epsilon(1e-3));
  }
}

TEST_CASE("bubble and dew line end in one critical point that meets the criticality conditions", "[phase]") {
  const data::Catalogue catalogue;
  for (const auto* name : {"R-404A", "R-407C", "R-410A", "R-448A", "R-454B", "R-454C", "R-455A", "R-507A", "R-513A", "R-401A", "R-436A"}) {
    const auto r = refrigerant(name, catalogue);
    const auto top = r.top();
    INFO(name << " " << top.temperature << " K " << top.reason);
    REQUIRE(top.is_critical_point);
    const auto c = phase::criticality(r.model(), top.temperature, top.molar_density, r.mole_fractions());
    CHECK(std::abs(c[0]) < 1e-9);
    CHECK(std::abs(c[1]) < 1e-9);
    // just below it both lines are close to its pressure
    const double T = top.temperature * (1 - 2e-4);
    const auto s = r.saturation({.temperature = T, .extrapolate = true});
    CHECK(s.bubble.pressure == Approx(top.pressure).epsilon(5e-3));
    CHECK(s.dew.pressure == Approx(top.pressure).epsilon(2e-2));
    CHECK(r.hottest(phase::Line::dew) >= top.temperature * (1 - 1e-12));
    CHECK(r.hottest(phase::Line::dew) < top.temperature * 1.005);
  }
}

// Critical temperatures of designated blends, AHRI Standard 700 and manufacturers, from memory, +-1.5 K (head of the
// table); models and editions differ.
TEST_CASE("critical temperatures of blends against published figures", "[phase][published]") {
  const data::Catalogue catalogue;
  int rows = 0;
  for (const auto& row : support::published("published/blend_normal_points.csv")) {
    const auto tc = row.number("tc_C");
    const auto b = catalogue.find_blend(row.text("designation"));
    if (!tc || !b) continue;
    bool published_pairs = true;
    for (const auto& c : b->components) published_pairs = published_pairs && !catalogue.compound(c)->equations.empty();
    if (!published_pairs) continue;
    const auto r = refrigerant(row.text("designation"), catalogue);
    for (const auto& p : r.pairs()) published_pairs = published_pairs && p.kind == data::PairKind::published;
    if (!published_pairs) continue;
    INFO(row.text("designation"));
    CHECK(std::abs(r.top().temperature - 273.15 - *tc) < 1.5);
    ++rows;
  }
  CHECK(rows >= 8);
}
