#include <algorithm>
#include <cctype>
#include <cmath>
#include <limits>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>
#include <vector>

#include "catch.hpp"
#include "zeotrope/apply/figures.hpp"
#include "zeotrope/apply/pt_chart.hpp"
#include "zeotrope/refrigerant.hpp"
#include "zeotrope/units.hpp"

using namespace zeotrope;
using namespace zeotrope::apply;
using U = units::Pressure;

namespace {

const data::Catalogue& catalogue() {
  static const data::Catalogue c;
  return c;
}

PtChart chart_of(const std::string& name, const ChartOptions& options = {}) { return pt_chart(parse_refrigerant(name, {}, catalogue()), options, catalogue()); }

ChartOptions in_units(std::vector<U> pressure, units::Temperature temperature = units::Temperature::celsius) {
  ChartOptions o;
  o.pressure_units = std::move(pressure);
  o.temperature_unit = temperature;
  return o;
}

const std::string new_blend = "R-32 50 + R-1234yf 30 + R-600a 20";

std::string replaced(std::string text, const std::string& what, const std::string& with) {
  for (auto at = text.find(what); at != std::string::npos; at = text.find(what, at + with.size())) text.replace(at, what.size(), with);
  return text;
}

/// Words with single blanks between them, so that line breaks do not matter; degree signs as in the coefficient files.
std::string flat(std::string text) {
  text = replaced(replaced(std::move(text), "\u00a0", " "), "\u00b0C", "degC");
  std::istringstream in(text);
  std::string out;
  for (std::string word; in >> word;) out += (out.empty() ? "" : " ") + word;
  return out;
}

/// What a browser shows of a page, without its style sheet.
std::string seen(std::string html) {
  html.erase(0, html.find("<body>"));
  std::string out;
  bool inside = false;
  for (const char c : html) {
    if (c == '<') inside = true;
    if (!inside) out += c;
    if (c == '>') inside = false;
  }
  for (const auto& [entity, character] : {std::pair{"&nbsp;", " "}, std::pair{"&minus;", "-"}, std::pair{"&ndash;", "-"}, std::pair{"&lt;", "<"},
                                          std::pair{"&gt;", ">"}, std::pair{"&quot;", "\""}, std::pair{"&#39;", "'"}, std::pair{"&amp;", "&"}})
    out = replaced(std::move(out), entity, character);
  return flat(out);
}

std::vector<std::string> lines(const std::string& text) {
  std::vector<std::string> out;
  std::istringstream in(text);
  for (std::string line; std::getline(in, line);) out.push_back(line);
  return out;
}

/// Cells of a line of CSV, RFC 4180.
std::vector<std::string> cells(const std::string& line) {
  std::vector<std::string> out{""};
  bool quoted = false;
  for (std::size_t i = 0; i < line.size(); ++i) {
    if (line[i] == '"' && quoted && i + 1 < line.size() && line[i + 1] == '"')
      out.back() += line[++i];
    else if (line[i] == '"')
      quoted = !quoted;
    else if (line[i] == ',' && !quoted)
      out.emplace_back();
    else
      out.back() += line[i];
  }
  return out;
}

std::vector<std::vector<std::string>> table_of(const std::string& csv) {
  std::vector<std::vector<std::string>> out;
  for (const auto& line : lines(csv))
    if (!line.starts_with('#')) out.push_back(cells(line));
  return out;
}

std::size_t count(const std::string& text, const std::string& what) {
  std::size_t n = 0;
  for (auto at = text.find(what); at != std::string::npos; at = text.find(what, at + 1)) ++n;
  return n;
}

bool has(const std::string& text, const std::string& what) { return text.find(what) != std::string::npos; }

}  // namespace

TEST_CASE("pressures are rounded as the trade prints them", "[render]") {
  // 1 psi = 6894.757 Pa, 1 inHg (0 C) = 3386.389 Pa, 1 kgf/cm2 = 98066.5 Pa: NIST SP 811, appendix B. Decimals: common practice.
  const double sea = 101325;
  SECTION("psig and psia: one decimal below 100, whole above") {
    CHECK(pressure_figure(500e3, U::psig, sea) == "57.8");     // 398675 / 6894.757 = 57.823
    CHECK(pressure_figure(500e3, U::psia, sea) == "72.5");     // 500000 / 6894.757 = 72.519
    CHECK(pressure_figure(1e6, U::psig, sea) == "130");        // 898675 / 6894.757 = 130.342
    CHECK(pressure_figure(790387.0, U::psig, sea) == "99.9");  // 689062.0 / 6894.757 = 99.940
    CHECK(pressure_figure(790594.0, U::psig, sea) == "100");   // 689269.0 / 6894.757 = 99.970: never "100.0"
  }
  SECTION("psig below ambient: inches of mercury vacuum in brackets") {
    CHECK(pressure_figure(50e3, U::psig, sea) == "(15.2)");  // 51325 / 3386.389 = 15.156
    CHECK(pressure_figure(0, U::psig, sea) == "(29.9)");     // 101325 / 3386.389 = 29.921
    CHECK(pressure_figure(sea, U::psig, sea) == "0.0");
    CHECK(pressure_figure(sea - 100, U::psig, sea) == "0.0");    // -0.0145 psi: no "-0.0", no bracket
    CHECK(pressure_figure(sea - 400, U::psig, sea) == "(0.1)");  // -0.058 psi; 0.118 inHg
    CHECK(pressure_figure(90e3, U::psig, 83e3) == "1.0");        // at 83 kPa ambient 90 kPa is no vacuum: 7000 / 6894.757 = 1.015
  }
  SECTION("bar and kgf/cm2: two decimals, half away from zero") {
    CHECK(pressure_figure(113825, U::bar_gauge, sea) == "0.13");  // 0.125
    CHECK(pressure_figure(88825, U::bar_gauge, sea) == "-0.13");  // -0.125
    CHECK(pressure_figure(101225, U::bar_gauge, sea) == "0.00");  // -0.001
    CHECK(pressure_figure(250e3, U::bar_absolute, sea) == "2.50");
    CHECK(pressure_figure(346491.25, U::kgf_cm2_gauge, sea) == "2.50");  // 101325 + 2.5 x 98066.5
  }
  SECTION("kPa: whole, one decimal below 100 kPa absolute; MPa: three decimals") {
    CHECK(pressure_figure(99940, U::kpa_absolute, sea) == "99.9");
    CHECK(pressure_figure(99960, U::kpa_absolute, sea) == "100");
    CHECK(pressure_figure(1234500, U::kpa_absolute, sea) == "1235");  // half away from zero
    CHECK(pressure_figure(50e3, U::kpa_gauge, sea) == "-51.3");
    CHECK(pressure_figure(1234600, U::mpa_absolute, sea) == "1.235");
  }
}

TEST_CASE("printed pairs survive a round trip", "[render]") {
  const auto unit = GENERATE(U::psig, U::bar_gauge, U::kpa_absolute, U::mpa_absolute);
  const auto name = GENERATE("R-454B", "R-134a", "R-717");
  const auto r = refrigerant(name, catalogue());
  const auto chart = chart_of(name, in_units({unit}));
  for (const auto& row : chart.rows) {
    if (!row.blank.empty() || *row.bubble_pressure < 20e3) continue;
    const auto printed = pressure_figure(*row.bubble_pressure, unit, units::standard_atmosphere);
    const bool vacuum = printed.starts_with('(');
    const double value = std::stod(vacuum ? printed.substr(1) : printed);
    const auto read_as = vacuum ? U::inhg_vacuum : unit;
    const double p = units::to_pascal(value, read_as, units::standard_atmosphere);
    const auto point = printed.find('.');
    const auto decimals = point == std::string::npos ? 0 : static_cast<int>(printed.find_last_of("0123456789") - point);
    const double half_step = 0.5001 * std::pow(10.0, -decimals) * units::unit(read_as).pascals;
    CAPTURE(name, row.argument, printed);
    CHECK(std::abs(p - *row.bubble_pressure) <= half_step);
    const double T = r.bubble({.pressure = p, .extrapolate = true}).temperature;
    const double slope = (*row.bubble_pressure - r.bubble({.temperature = *row.bubble_temperature - 0.01, .extrapolate = true}).pressure) / 0.01;  // Pa/K
    CHECK(std::abs(T - *row.bubble_temperature) <= 1.02 * half_step / slope);
    CHECK(pressure_figure(r.bubble({.temperature = T, .extrapolate = true}).pressure, unit, units::standard_atmosphere) == printed);
  }
}

TEST_CASE("vacuum figures are marked and explained", "[render]") {
  const auto chart = chart_of("R-134a", in_units({U::psig}));
  const auto text = render_text(chart);
  CHECK(has(text, "(14.8)"));  // R-134a at -40 C: 51.21 kPa (Tillner-Roth and Baehr 1994); 50.12 / 3.386389 = 14.80 inHg
  CHECK(has(text, "inches of mercury vacuum"));
  const auto html = render_card(chart);
  CHECK(has(html, "<td class=\"vacuum bracket\">(14.8)</td>"));
  CHECK(has(seen(html), "inches of mercury vacuum"));
  const auto bar = render_card(chart_of("R-134a"));
  CHECK(has(bar, "<td class=\"vacuum\">&minus;0.50</td>"));  // 51.21 - 101.325 kPa
  CHECK(has(seen(bar), "minus sign is a vacuum"));
  CHECK_FALSE(has(render_text(chart_of("R-744", in_units({U::psig}))), "inches of mercury"));
}

TEST_CASE("a chart has one column only where the glide is small, and says so", "[render]") {
  const auto pure = render_text(chart_of("R-134a"));
  CHECK(has(pure, "saturation"));
  CHECK_FALSE(has(pure, "(vapour)"));
  CHECK(has(flat(pure), "a single compound boils and condenses at the same temperature"));
  const auto two = flat(render_text(chart_of("R-454B")));
  CHECK(has(two, "bubble dew glide (liquid) (vapour)"));
  CHECK(has(two, "Superheat: DEW column"));
  CHECK(has(two, "Subcooling: BUBBLE column"));

  auto small = chart_of("R-410A");
  small.one_column = true;
  small.largest_glide = 0.08;
  for (const auto& text : {flat(render_text(small)), seen(render_card(small))}) CHECK(has(text, "the largest glide in this chart is 0.08 K"));
  // programs get both columns in any case
  CHECK(has(render_csv(small), "dew pressure [bar(g)]"));
}

TEST_CASE("the boiling row is marked", "[render]") {
  // R-134a boils at -26.1 C (Tillner-Roth and Baehr 1994): the row of -25 C
  const auto chart = chart_of("R-134a");
  std::vector<std::string> marked;
  for (const auto& line : lines(render_text(chart)))
    if (line.ends_with(" *")) marked.push_back(line);
  REQUIRE(marked.size() == 1);
  CHECK(has(marked.front(), "-25 "));
  const auto html = render_card(chart);
  CHECK(count(html, "<tr class=\"boiling\">") == 1);
  CHECK(has(html, "&#9654;</span>&minus;25</th>"));
  // R-744 has no liquid at 101.325 kPa
  CHECK(count(render_card(chart_of("R-744")), "<tr class=\"boiling\">") == 0);
}

TEST_CASE("JSON parses, keeps the figures and never holds NaN", "[render]") {
  auto chart = chart_of("R-454B", in_units({U::psig, U::bar_absolute}));
  const auto j = nlohmann::json::parse(render_json(chart));
  CHECK(j.at("schema_version") == 1);
  CHECK(j.at("identity").at("name") == "R-454B");
  CHECK(j.at("identity").at("safety_group") == "A2L");
  CHECK(j.at("options").at("pressure_units").at(1).at("unit") == "bar(a)");
  REQUIRE(j.at("rows").size() == chart.rows.size());
  for (std::size_t i = 0; i < chart.rows.size(); ++i) {
    const auto& row = j.at("rows").at(i);
    CHECK(row.at("si").at("bubble_pressure_Pa").get<double>() == *chart.rows[i].bubble_pressure);
    CHECK(row.at("shown").at("dew_pressure").at(1).at("value").get<double>() == Approx(*chart.rows[i].dew_pressure / 1e5));
    CHECK(row.at("shown").at("bubble_pressure").at(0).at("printed") == pressure_figure(*chart.rows[i].bubble_pressure, U::psig, units::standard_atmosphere));
  }

  chart.rows[0].bubble_pressure = std::numeric_limits<double>::quiet_NaN();
  chart.rows[1].glide = std::numeric_limits<double>::infinity();
  chart.rows[2].dew_temperature.reset();
  chart.rows[2].blank = "a reason";
  const auto broken = render_json(chart);
  const auto k = nlohmann::json::parse(broken);
  CHECK(k.at("rows").at(0).at("si").at("bubble_pressure_Pa").is_null());
  CHECK(k.at("rows").at(0).at("shown").at("bubble_pressure").at(0).at("printed").is_null());
  CHECK(k.at("rows").at(1).at("shown").at("glide").is_null());
  CHECK(k.at("rows").at(2).at("si").at("dew_temperature_K").is_null());
  CHECK(k.at("rows").at(2).at("blank") == "a reason");
  for (auto text : {broken, render_text(chart), render_csv(chart), render_card(chart)}) {
    for (auto& c : text)
      if (!std::isalnum(static_cast<unsigned char>(c))) c = ' ';
    std::istringstream in(text);
    for (std::string word; in >> word;) REQUIRE((word != "nan" && word != "NaN" && word != "inf"));
  }
}

TEST_CASE("CSV has as many cells in each row as column names", "[render]") {
  ChartOptions by_pressure = in_units({U::bar_gauge, U::psig});
  by_pressure.by = ChartOptions::By::pressure;
  ChartOptions far = in_units({U::psig, U::kpa_absolute}, units::Temperature::fahrenheit);
  far.from = -300;
  far.to = 400;
  far.step = 20;
  for (auto chart : {chart_of("R-454B"), chart_of("R-455A", by_pressure), chart_of("R-134a", far)}) {
    chart.rows.back().blank = "a reason, with \"quotes\"";
    const auto table = table_of(render_csv(chart));
    REQUIRE(table.size() == chart.rows.size() + 1);
    for (const auto& row : table) CHECK(row.size() == table.front().size());
    CHECK(table.front().back() == "note");
    CHECK(has(table.back().back(), "a reason, with \"quotes\""));
  }
  const auto table = table_of(render_csv(chart_of("R-134a", far)));
  CHECK(table.front().front() == "temperature [degF]");
  CHECK(table[1].front() == "-300");
  CHECK(table[1][1].empty());  // far below the published range
  CHECK(table[1].back() == "outside the published range");
  CHECK(has(table.back().back(), "critical temperature"));

  const auto chart = chart_of("R-134a");
  const auto head = table_of(render_csv(chart)).front();
  const auto column = std::find(head.begin(), head.end(), "SI bubble pressure [Pa]") - head.begin();
  REQUIRE(static_cast<std::size_t>(column) < head.size());
  for (std::size_t i = 0; i < chart.rows.size(); ++i)
    CHECK(std::stod(table_of(render_csv(chart))[i + 1][static_cast<std::size_t>(column)]) == *chart.rows[i].bubble_pressure);
}

TEST_CASE("the card stands alone", "[render]") {
  for (const auto* name : {"R-454B", "R-744", new_blend.c_str()}) {
    const auto html = render_card(chart_of(name));
    for (const auto* outside : {"http:", "https:", "//", "src=", "href=", "url(", "<script", "<link", "@import", "<img"}) {
      CAPTURE(name, outside);
      CHECK_FALSE(has(html, outside));
    }
    CHECK(html.starts_with("<!DOCTYPE html>"));
    CHECK(has(html, "<html lang=\"en\">"));
    CHECK(has(html, "<meta charset=\"utf-8\">"));
    CHECK(has(html, "<title>"));
    CHECK(has(html, "@page { margin: 10mm }"));
    for (const auto* tag : {"table", "tr", "td", "th", "p", "section", "div", "span", "ul", "li"})
      CHECK(count(html, std::string("<") + tag + ">") + count(html, std::string("<") + tag + " ") == count(html, std::string("</") + tag + ">"));
  }
}

TEST_CASE("text from outside is escaped", "[render]") {
  auto chart = chart_of("R-454B");
  chart.identity.name = "<b>&\"'x";
  chart.options.ambient_note = "<script>alert(1)</script>";
  chart.rows.front().blank = "<i>\nwhy";
  chart.cautions.front().short_text = "<img src=x>";
  const auto html = render_card(chart);
  CHECK(has(html, "&lt;b&gt;&amp;&quot;&#39;x</h1>"));
  for (const auto* raw : {"<b>&", "<script", "<img", "<i>\n"}) CHECK_FALSE(has(html, raw));
  CHECK(nlohmann::json::parse(render_json(chart)).at("identity").at("name") == "<b>&\"'x");
  chart.identity.name = "two\nlines, and a comma";
  const auto csv = render_csv(chart);
  CHECK(has(csv, "# two lines, and a comma"));
  CHECK(table_of(csv).size() == chart.rows.size() + 1);
  chart.identity.name = "\xff\xfe";  // not UTF-8
  CHECK(nlohmann::json::parse(render_json(chart)).is_object());
}

TEST_CASE("charts carry the cautions of their refrigerant", "[render]") {
  const auto check = [](const std::string& name, const std::vector<std::string>& cautions) {
    const auto chart = chart_of(name);
    const auto text = flat(render_text(chart)), csv = flat(render_csv(chart)), card = seen(render_card(chart));
    const auto json = render_json(chart);
    for (const auto& wanted : cautions) {
      CAPTURE(name, wanted);
      CHECK(std::any_of(chart.cautions.begin(), chart.cautions.end(), [&](const auto& c) { return c.name == wanted; }));
      CHECK(has(json, "\"name\": \"" + wanted + "\""));
    }
    for (const auto& c : chart.cautions) {
      CAPTURE(name, c.name);
      CHECK(has(text, flat(c.short_text)));
      CHECK(has(csv, flat(c.short_text)));
      CHECK(has(card, flat(c.short_text)));
    }
  };
  check("R-454B", {"ignition-sources", "cut-not-braze", "charge-as-liquid", "bubble-and-dew", "trained-persons", "what-prevails"});
  check("R-744", {"carbon-dioxide-toxicity", "dry-ice", "transcritical", "high-pressure-set"});
  check("R-717", {"ammonia-hazards", "toxic-group", "ignition-sources"});
}

TEST_CASE("a new blend is said to be unclassified, and its estimated pair estimated", "[render]") {
  const auto chart = chart_of(new_blend);
  const std::string unclassified = "not classified: flammability and toxicity of this blend have not been assessed";
  const auto text = flat(render_text(chart)), csv = flat(render_csv(chart)), card = seen(render_card(chart));
  for (const auto& form : {text, csv, card}) {
    CHECK(has(form, unclassified));
    CHECK(has(form, "R-1234yf / R-600a (estimated by rule"));
  }
  CHECK(has(text, "estimated: R-1234yf / R-600a"));
  CHECK(has(text, "not given IPCC AR6"));  // R-600a has none there
  const auto j = nlohmann::json::parse(render_json(chart));
  CHECK(j.at("identity").at("safety_group").is_null());
  CHECK(j.at("identity").at("safety") == unclassified);
  CHECK_FALSE(has(flat(render_text(chart_of("R-454B"))), "estimated:"));
}

TEST_CASE("global warming potentials come with their report", "[render]") {
  auto chart = chart_of("R-454B");
  chart.identity.gwp = {{"IPCC AR4", 466.5, false}, {"IPCC AR5", 466.4, true}, {"IPCC AR6", std::nullopt, false}};
  const auto text = flat(render_text(chart));
  CHECK(has(text, "467 IPCC AR4"));  // half away from zero
  CHECK(has(text, "466 IPCC AR5; the sum counts a component printed \"<1\" there as 1"));
  CHECK(has(text, "not given IPCC AR6"));
  auto pure = chart_of("R-1234yf");
  pure.identity.gwp = {{"IPCC AR5", 1, true}};
  CHECK(has(flat(render_text(pure)), "<1 IPCC AR5"));
  CHECK(has(render_card(pure), "&lt;1"));
}

TEST_CASE("a long chart is thinned on the card, which says so", "[render]") {
  ChartOptions o;
  o.from = -60;
  o.to = 70;
  o.step = 0.5;
  const auto chart = chart_of("R-407C", o);
  const auto html = render_card(chart);
  CHECK(count(html, "<th scope=\"row\"") < 90);
  CHECK(count(html, "<th scope=\"row\"") > 20);
  CHECK(has(seen(html), "row of the chart in steps of 0.5 K"));
  CHECK(has(seen(render_card(chart_of("R-407C"))), "Printed in steps of 5 K"));
  // a chart without any figure still gives a card that tells why
  o.from = 200;
  o.to = 300;
  o.step = 1;
  CHECK(has(seen(render_card(chart_of("R-407C", o))), "no figure"));
}

TEST_CASE("figures for another air pressure say so", "[render]") {
  auto o = in_units({U::psig});
  o.ambient = units::atmosphere_at_altitude(1600);
  o.ambient_note = "altitude 1600 m";
  const auto chart = chart_of("R-134a", o);
  for (const auto& form : {flat(render_text(chart)), flat(render_csv(chart)), seen(render_card(chart))}) CHECK(has(form, "absolute (altitude 1600 m)"));
}
