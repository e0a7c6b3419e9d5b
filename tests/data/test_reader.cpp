#include <random>
#include <string>

#include "catch.hpp"
#include "zeotrope/data/reader.hpp"
#include "zeotrope/error.hpp"

using namespace zeotrope;

namespace {

/// An invented demonstration fluid: every table and key once. The figures belong to no real fluid.
const std::string sound = R"(# DEMO-1, demonstration fluid
[identity]
designation = "DEMO-1"
chemical_name = "demonstration fluid"
formula = "C2H4"
molar_mass = 0.05
aliases = ["demo"]
[safety]
group = "A1"
[environment]
gwp100_ar4 = 1.0
below = ["gwp100_ar4"]
sources = { gwp100_ar4 = "invented" }
[constants]
acentric_factor = 0.2
[[equation]]
name = "Demo 2026"
kind = "helmholtz"
source = "invented"
molar_mass = 0.05
gas_constant = 8.314462618
reducing_temperature = 350.0
reducing_density = 8000.0
critical_point = { temperature = 350.0, pressure = 5.0e6, density = 8000.0 }
temperature_range = [150.0, 500.0]
maximum_pressure = 50e6
[equation.ideal_gas]
constant = 4.0
power = [[0.1, 0.5]]
einstein = [[1.0, 800.0]]
[equation.residual]
power = [[1.0, 0.25, 1], [-1.5, 1.25, 1]]
exponential = [[0.1, 1, 2, 1]]
[[equation.check_state]]
source = "invented"
temperature = 300.0
density = 10.0
pressure = 24000.0
within = 0.5
)";

std::string with(const std::string& from, const std::string& to) {
  std::string s = sound;
  const auto at = s.find(from);
  REQUIRE(at != std::string::npos);
  return s.replace(at, from.size(), to);
}

/// The error of a broken text: line, key, and a part of the message.
void check_fault(const std::string& text, const std::string& key, const std::string& part) {
  try {
    data::parse_compound(text, "demo.toml");
    FAIL("no error for: " << part);
  } catch (const BadFile& e) {
    INFO(e.what());
    CHECK(e.file() == "demo.toml");
    CHECK(e.line() > 0);
    CHECK(e.key() == key);
    CHECK(std::string(e.what()).find(part) != std::string::npos);
    CHECK(std::string(e.what()).find("demo.toml:" + std::to_string(e.line())) == 0);
  }
}

}  // namespace

TEST_CASE("a sound file reads", "[reader]") {
  const auto c = data::parse_compound(sound, "demo.toml");
  CHECK(c.designation == "DEMO-1");
  REQUIRE(c.equations.size() == 1);
  CHECK(c.equations[0].residual.power.size() == 2);
  CHECK(c.environment.ar4->below);
}

TEST_CASE("every fault names file, line, key, what was found and what is wanted", "[reader]") {
  check_fault(with("molar_mass = 0.05\naliases", "molar_mass = nan\naliases"), "identity.molar_mass", "found nan");
  check_fault(with("molar_mass = 0.05\naliases", "molar_mass = inf\naliases"), "identity.molar_mass", "found inf");
  check_fault(with("molar_mass = 0.05\naliases", "molar_mass = 50\naliases"), "identity.molar_mass", "kg/mol");
  check_fault(with("molar_mass = 0.05\naliases", "molar_mass = \"heavy\"\naliases"), "identity.molar_mass", "found the text \"heavy\"");
  check_fault(with("designation = \"DEMO-1\"\n", ""), "identity.designation", "missing");
  check_fault(with("designation = \"DEMO-1\"", "designation = \"--\""), "identity.designation", "letters or digits");
  check_fault(with("formula =", "formular ="), "identity.formula", "missing");
  check_fault(with("aliases = [\"demo\"]", "aliases = [\"demo\"]\ncolour = \"blue\""), "identity.colour", "unknown key; known here are");
  check_fault(with("[constants]", "[konstants]\n[constants]"), "konstants", "unknown key");
  check_fault(with("[-1.5, 1.25, 1]", "[-1.5, 1.25]"), "equation[1].residual.power", "row 2 has 2 numbers; 3 are wanted: [n, t, d]");
  check_fault(with("[-1.5, 1.25, 1]", "[-1.5, inf, 1]"), "equation[1].residual.power", "found inf");
  check_fault(with("[-1.5, 1.25, 1]", "[-1.5, 1.25, -1]"), "equation[1].residual.power", "not below 0");
  check_fault(with("[-1.5, 1.25, 1]", "7"), "equation[1].residual.power", "a row [n, t, d] is wanted");
  check_fault(with("exponential = [[0.1, 1, 2, 1]]", "exponential = [[0.1, 1, 2, 0]]"), "equation[1].residual.exponential", "a number above 0");
  check_fault(with("einstein = [[1.0, 800.0]]", "einstein = [[1.0, 0.0]]"), "equation[1].ideal_gas.einstein", "above 0");
  check_fault(with("[150.0, 500.0]", "[500.0, 150.0]"), "equation[1].temperature_range", "lower first");
  check_fault(with("kind = \"helmholtz\"", "kind = \"magic\""), "equation[1].kind", "magic");
  check_fault(with("gas_constant = 8.314462618", "gas_constant = 1.987"), "equation[1].gas_constant", "8.314");
  check_fault(with("source = \"invented\"\nmolar_mass = 0.05", "source = \"invented\"\nmolar_mass = 0.06"), "equation[1].molar_mass", "identity.molar_mass");
  check_fault(with("group = \"A1\"", "group = \"A9\""), "safety.group", "A9");
  check_fault(with("below = [\"gwp100_ar4\"]", "below = [\"gwp100_ar6\"]"), "environment.below", "gwp100_ar6");
  check_fault(with("pressure = 24000.0\n", ""), "equation[1].check_state[1].pressure", "nothing to check");
  check_fault(with("within = 0.5", "within = -1"), "equation[1].check_state[1].within", "between 0 and 1");
  check_fault(with("[identity]", "[identity"), "", "not TOML");
  check_fault(with("formula = \"C2H4\"", "formula = \"C2H4\"\nformula = \"C2H6\""), "", "not TOML");  // a duplicate key
  check_fault(sound + sound.substr(sound.find("[[equation]]"), sound.find("[[equation.check_state]]") - sound.find("[[equation]]")), "equation[2].name", "stands twice");
}

TEST_CASE("a huge array or file is refused, not swallowed", "[reader]") {
  std::string rows;
  for (int i = 0; i < 600; ++i) rows += "[1.0, 1.0, 1],";
  check_fault(with("power = [[1.0, 0.25, 1], [-1.5, 1.25, 1]]", "power = [" + rows + "]"), "equation[1].residual.power", "at most 500");
  CHECK_THROWS_AS(data::parse_compound(std::string(5u << 20u, '#'), "big.toml"), BadFile);
  CHECK_THROWS_AS(data::parse_compound(std::string(100000, '['), "deep.toml"), BadFile);
  CHECK_THROWS_AS(data::read_compound("/nowhere/at/all.toml"), BadFile);
}

TEST_CASE("blends: compositions add to 100, names are single", "[reader]") {
  const auto blend = [](const std::string& body) { return data::parse_blends("[[blend]]\ndesignation = \"R-9A\"\n" + body, "blends.toml"); };
  CHECK(blend("components = [\"R-32\", \"R-125\"]\nmass_percent = [50, 50]\n").size() == 1);
  CHECK_THROWS_WITH(blend("components = [\"R-32\", \"R-125\"]\nmass_percent = [50, 49]\n"), Catch::Contains("add to 99; 100 is wanted"));
  CHECK_THROWS_WITH(blend("components = [\"R-32\", \"r32\"]\nmass_percent = [50, 50]\n"), Catch::Contains("stands twice"));
  CHECK_THROWS_WITH(blend("components = [\"R-32\", \"R-125\"]\nmass_percent = [100]\n"), Catch::Contains("1 figures for 2 components"));
  CHECK_THROWS_WITH(blend("components = [\"R-32\", \"R-125\"]\nmass_percent = [-50, 150]\n"), Catch::Contains("above 0"));
  CHECK_THROWS_WITH(blend("components = []\nmass_percent = []\n"), Catch::Contains("at least one"));
  const std::string one = "[[blend]]\ndesignation = \"R-9A\"\ncomponents = [\"R-32\"]\nmass_percent = [100]\n";
  CHECK_THROWS_WITH(data::parse_blends(one + one, "b.toml"), Catch::Contains("stands twice"));
}

TEST_CASE("pairs: kinds, sources and rows", "[reader]") {
  const std::string head = "[sources]\nown = \"invented\"\n";
  const auto pairs = [&](const std::string& rows) { return data::parse_pairs("pair = [" + rows + "]\n" + head, "pairs.toml"); };
  const std::string good = R"({ fluids = ["R-32", "R-125"], beta_T = 1, gamma_T = 1.01, beta_v = 1, gamma_v = 1, kind = "fitted", source = "own" })";
  CHECK(pairs(good).pairs.size() == 1);
  CHECK_THROWS_WITH(pairs(good + "," + good), Catch::Contains("stands twice"));
  CHECK_THROWS_WITH(pairs(R"({ fluids = ["R-32", "R-125"], beta_T = 0, gamma_T = 1.01, beta_v = 1, gamma_v = 1, kind = "fitted", source = "own" })"), Catch::Contains("between 0.1 and 10"));
  CHECK_THROWS_WITH(pairs(R"({ fluids = ["R-32"], beta_T = 1, gamma_T = 1.01, beta_v = 1, gamma_v = 1, kind = "fitted", source = "own" })"), Catch::Contains("two different"));
  CHECK_THROWS_WITH(pairs(R"({ fluids = ["R-32", "R-125"], beta_T = 1, gamma_T = 1.01, beta_v = 1, gamma_v = 1, kind = "guessed", source = "own" })"), Catch::Contains("guessed"));
  CHECK_THROWS_WITH(pairs(R"({ fluids = ["R-32", "R-125"], beta_T = 1, gamma_T = 1.01, beta_v = 1, gamma_v = 1, kind = "fitted", source = "none" })"), Catch::Contains("[sources]"));
}

TEST_CASE("damaged text never crashes the reader", "[reader]") {
  // every cut, and random changes of bytes: an error or a record, nothing else
  std::mt19937 random(1);
  for (std::size_t cut = 0; cut < sound.size(); cut += 7) {
    try {
      data::parse_compound(std::string_view(sound).substr(0, cut), "cut.toml");
    } catch (const BadFile&) {
    }
  }
  for (int trial = 0; trial < 3000; ++trial) {
    std::string s = sound;
    for (int k = 0; k < 3; ++k) s[random() % s.size()] = static_cast<char>(random() % 256);
    try {
      data::parse_compound(s, "noise.toml");
    } catch (const BadFile&) {
    }
  }
  SUCCEED();
}
