#include <cmath>

#include "catch.hpp"
#include "zeotrope/apply/pt_chart.hpp"

using namespace zeotrope;
using By = apply::ChartOptions::By;

TEST_CASE("a chart by temperature", "[apply]") {
  const data::Catalogue catalogue;
  const auto r = refrigerant("R-454B", catalogue);
  const auto chart = apply::pt_chart(r, {.from = -50.0, .to = 70.0, .step = 1.0}, catalogue);
  REQUIRE(chart.rows.size() == 121);
  CHECK_FALSE(chart.one_column);
  for (const auto& row : chart.rows) {
    INFO(row.argument << " C");
    CHECK(row.argument == std::round(row.argument));
    if (!row.blank.empty()) {
      CHECK(units::to_kelvin(row.argument, units::Temperature::celsius) > 0.98 * chart.identity.top.temperature);
      CHECK_FALSE(row.bubble_pressure);
      continue;
    }
    const double T = units::to_kelvin(row.argument, units::Temperature::celsius);
    CHECK(*row.bubble_pressure == r.bubble({.temperature = T}).pressure);
    CHECK(*row.dew_pressure == r.dew({.temperature = T}).pressure);
    CHECK(*row.bubble_pressure >= *row.dew_pressure);
    CHECK(row.fugacity_mismatch < 1e-9);
    CHECK(*row.glide == Approx(r.glide(*row.bubble_pressure)).epsilon(1e-9));
  }
}

TEST_CASE("a chart by pressure is the other direction of the same lines", "[apply]") {
  const data::Catalogue catalogue;
  const auto r = refrigerant("R-407C", catalogue);
  const auto chart = apply::pt_chart(r, {.by = By::pressure, .from = 0.0, .to = 20.0, .step = 0.5}, catalogue);
  REQUIRE(chart.rows.size() == 41);
  for (const auto& row : chart.rows) {
    const double p = 1e5 * row.argument + 101325;
    CHECK(r.bubble({.temperature = *row.bubble_temperature}).pressure == Approx(p).epsilon(1e-9));
    CHECK(r.dew({.temperature = *row.dew_temperature}).pressure == Approx(p).epsilon(1e-9));
    CHECK(*row.glide == Approx(*row.dew_temperature - *row.bubble_temperature));
  }
}

TEST_CASE("one column for what has no glide", "[apply]") {
  const data::Catalogue catalogue;
  CHECK(apply::pt_chart(refrigerant("R-134a", catalogue), {}, catalogue).one_column);
  CHECK(apply::pt_chart(refrigerant("R-507A", catalogue), {}, catalogue).one_column);
  CHECK_FALSE(apply::pt_chart(refrigerant("R-410A", catalogue), {}, catalogue).one_column);  // 0.1 K and more
  CHECK_FALSE(apply::pt_chart(refrigerant("R-455A", catalogue), {}, catalogue).one_column);
}

TEST_CASE("rows that have no figure say why", "[apply]") {
  const data::Catalogue catalogue;
  const auto r = refrigerant("R-744", catalogue);
  const auto chart = apply::pt_chart(r, {.from = -70.0, .to = 40.0, .step = 10.0}, catalogue);
  CHECK(chart.rows.front().blank == "outside the published range");
  CHECK(chart.rows.back().blank.starts_with("above"));
  int figures = 0;
  for (const auto& row : chart.rows) figures += row.bubble_pressure ? 1 : 0;
  CHECK(figures == 8);  // -50 to 20 C: 0.98 of the critical temperature is 24.9 C
}

TEST_CASE("a default chart of every fluid has figures", "[apply]") {
  const data::Catalogue catalogue;
  int charts = 0;
  for (const auto& name : catalogue.compound_designations()) {
    if (catalogue.compound(name)->equations.empty()) continue;
    for (const auto by : {By::temperature, By::pressure}) {
      const auto chart = apply::pt_chart(refrigerant(name, catalogue), {.by = by}, catalogue);
      INFO(name);
      int figures = 0;
      for (const auto& row : chart.rows) figures += row.bubble_pressure && row.bubble_temperature ? 1 : 0;
      CHECK(figures >= 2);
      ++charts;
    }
  }
  CHECK(charts == 2 * 95);
}

TEST_CASE("rows by vacuum stay below ambient pressure", "[apply]") {
  const data::Catalogue catalogue;
  const auto chart = apply::pt_chart(refrigerant("R-134a", catalogue), {.by = By::pressure, .pressure_units = {units::Pressure::inhg_vacuum}}, catalogue);
  REQUIRE(chart.rows.size() == 30);
  CHECK(chart.rows.front().argument == 0);
  CHECK(*chart.rows.front().bubble_temperature == Approx(refrigerant("R-134a", catalogue).bubble({.pressure = 101325.0}).temperature));
}

TEST_CASE("bad chart options", "[apply]") {
  const data::Catalogue catalogue;
  const auto r = refrigerant("R-134a", catalogue);
  CHECK_THROWS_AS(apply::pt_chart(r, {.step = 0.0}, catalogue), BadInput);
  CHECK_THROWS_AS(apply::pt_chart(r, {.step = -1.0}, catalogue), BadInput);
  CHECK_THROWS_AS(apply::pt_chart(r, {.from = 10.0, .to = 0.0}, catalogue), BadInput);
  CHECK_THROWS_AS(apply::pt_chart(r, {.from = std::nan("")}, catalogue), BadInput);
  CHECK_THROWS_AS(apply::pt_chart(r, {.from = -40.0, .to = 60.0, .step = 1e-4}, catalogue), BadInput);
  CHECK_THROWS_AS(apply::pt_chart(r, {.pressure_units = {}}, catalogue), BadInput);
  CHECK_THROWS_AS(apply::pt_chart(r, {.ambient = 0.0}, catalogue), BadInput);
}
