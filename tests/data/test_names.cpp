#include "catch.hpp"
#include "zeotrope/data/names.hpp"

using zeotrope::data::name_key;
using zeotrope::data::nearest_names;

TEST_CASE("spellings of one designation share a key", "[data]") {
  for (const auto* s : {"R-454B", "454B", "r454b", "R454B", " r 454b ", "R_454-B"}) CHECK(name_key(s) == "454b");
  CHECK(name_key("R-1234ze(E)") == name_key("r1234zeE"));
  CHECK(name_key("RC318") == name_key("R-C318"));
  CHECK(name_key("E170") == name_key("R-E170"));
  CHECK(name_key("n-heptane") == "nheptane");
  CHECK(name_key("R") == "r");
  CHECK(name_key("-- ()").empty());
}

TEST_CASE("suggestions are near and few", "[data]") {
  const std::vector<std::string> known{"R-454A", "R-454B", "R-454C", "R-32", "propane"};
  const auto near = nearest_names("R-454D", known);
  REQUIRE(near.size() >= 3);
  CHECK(near[0] == "R-454A");
  CHECK(nearest_names("propan", known).front() == "propane");
  CHECK(nearest_names("qqqqqqqqqqqq", known).empty());
}
