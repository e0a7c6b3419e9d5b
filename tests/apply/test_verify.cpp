#include <set>
#include <string>

#include "catch.hpp"
#include "zeotrope/apply/verify.hpp"
#include "zeotrope/data/catalogue.hpp"

using namespace zeotrope;

TEST_CASE("every shipped equation passes its own checks", "[apply][published]") {
  // (fluid, beginning of the check) that is known to be loose, with the reason
  const std::set<std::pair<std::string, std::string>> loose{
      // Bender equations of 1990: their own critical points lie above the tabulated ones (notes to the data)
      {"R-13", "pressure of the critical point"},
      {"R-114", "pressure of the critical point"},
      {"R-21", "pressure of the critical point"},
      // 12-term technical equations of 2003: critical derivatives to 1e-2 by their nature (notes to the data)
      {"n-heptane", "pressure of the critical point"},
      // 0.023 K, for the same reason
      {"R-13", "normal boiling point"},
      // 0.14 K above the stated 489.3 K, which is a rounded figure of a table; the equation's file has no other
      {"n-dodecane", "normal boiling point"},
  };
  const data::Catalogue catalogue;
  int checks = 0;
  for (const auto& name : catalogue.compound_designations()) {
    const auto c = catalogue.compound(name);
    for (const auto& r : apply::verify(*c)) {
      ++checks;
      INFO(name << ", " << r.equation << ": " << r.what << " published " << r.published << " computed " << r.computed << " within " << r.within << " " << r.note);
      // an entry that has become sound must go
      CHECK(r.passed == !loose.contains({name, r.what}));
    }
  }
  CHECK(checks > 500);
}
