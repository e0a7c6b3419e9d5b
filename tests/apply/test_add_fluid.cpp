#include <filesystem>
#include <fstream>
#include <regex>
#include <sstream>

#include <fmt/format.h>

#include "catch.hpp"
#include "zeotrope/apply/pt_chart.hpp"
#include "zeotrope/apply/verify.hpp"
#include "zeotrope/data/reader.hpp"

using namespace zeotrope;
namespace fs = std::filesystem;

// Adding a fluid is one file. The fluid is invented for the demonstration: the shape of R-134a's equation at reducing
// values of no real fluid.
TEST_CASE("a new coefficient file is verified and charted in a blend", "[apply]") {
  const data::Catalogue shipped;
  std::ifstream in(shipped.compound("R-134a")->file);
  std::ostringstream read;
  read << in.rdbuf();
  auto text = read.str();
  const auto change = [&](const char* what, const std::string& to) {
    const std::regex pattern(what);
    REQUIRE(std::regex_search(text, pattern));
    text = std::regex_replace(text, pattern, to, std::regex_constants::format_first_only);
  };
  change("designation = \"R-134a\"", "designation = \"DEMO-7\"");
  change("cas = \"[^\"]*\"\n", "");
  change("aliases = \\[[^\\]]*\\]\n", "");
  change("reducing_temperature = [0-9.]+", "reducing_temperature = 400.0");
  change("critical_point = \\{ temperature = [0-9.]+", "critical_point = { temperature = 400.03");
  // its own check rows belong to R-134a; one is replaced by the corresponding state: pressure scales as T at equal tau, delta
  const auto r134a = refrigerant("R-134a", shipped);
  const double scale = 400.0 / r134a.components().front().equation->reducing_temperature;
  text = text.substr(0, text.find("[[equation.check_saturation]]"));
  text = std::regex_replace(text, std::regex("pressure = [0-9.]+, density"), fmt::format("pressure = {:.1f}, density", r134a.top().pressure * scale));
  text = std::regex_replace(text, std::regex("normal_boiling_point[a-z_]* = .*\n"), "");
  text += fmt::format("[[equation.check_saturation]]\nsource = \"corresponding state of R-134a\"\ntemperature = {:.6f}\npressure = {:.3f}\nwithin = 1e-6\n", 280.0 * scale,
                      r134a.bubble({.temperature = 280.0}).pressure * scale);

  const auto folder = fs::temp_directory_path() / "zeotrope-test-add-fluid";
  fs::remove_all(folder);
  fs::create_directories(folder / "compounds");
  std::ofstream(folder / "compounds" / "DEMO-7.toml") << text;

  const data::Catalogue catalogue({folder});
  for (const auto& check : apply::verify(*catalogue.compound("demo7"))) {
    INFO(check.what << " published " << check.published << " computed " << check.computed << " " << check.note);
    CHECK(check.passed);
  }
  const auto r = blend({{"DEMO-7", 0.4}, {"R-32", 0.6}}, {}, catalogue);
  CHECK(r.pairs().front().kind == data::PairKind::rule);
  const auto chart = apply::pt_chart(r, {.from = -20.0, .to = 40.0, .step = 10.0}, catalogue);
  for (const auto& row : chart.rows) {
    CHECK(row.blank.empty());
    CHECK(*row.bubble_pressure > *row.dew_pressure);
    CHECK(row.fugacity_mismatch < 1e-9);
  }
  CHECK(apply::render_text(chart).find("DEMO-7 / R-32") != std::string::npos);
  fs::remove_all(folder);
}
