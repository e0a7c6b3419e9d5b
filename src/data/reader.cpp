#include "zeotrope/data/reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <fstream>
#include <set>
#include <sstream>

#include "toml_cursor.hpp"
#include "zeotrope/data/names.hpp"

namespace zeotrope::data {

namespace {

constexpr std::uintmax_t largest_file = 4u << 20u;

std::string slurp(const std::filesystem::path& file) {
  std::error_code fault;
  const auto size = std::filesystem::file_size(file, fault);
  if (fault) throw BadFile(file.string(), 0, "", fmt::format("cannot be read ({}); a coefficient file is wanted", fault.message()));
  if (size > largest_file) throw BadFile(file.string(), 0, "", fmt::format("{} bytes; at most {} are read", size, largest_file));
  std::ifstream in(file, std::ios::binary);
  std::ostringstream text;
  text << in.rdbuf();
  if (!in) throw BadFile(file.string(), 0, "", "cannot be read; a coefficient file is wanted");
  return text.str();
}

toml::table parse(std::string_view text, const std::string& name) {
  if (text.size() > largest_file) throw BadFile(name, 0, "", fmt::format("{} bytes; at most {} are read", text.size(), largest_file));
  try {
    return toml::parse(text, std::string_view(name));
  } catch (const toml::parse_error& e) {
    throw BadFile(name, static_cast<int>(e.source().begin.line), "", fmt::format("not TOML: {}", e.description()));
  }
}

// ---- parts

IdealGas ideal_gas(Cursor c) {
  IdealGas g;
  g.source = c.text_or("source");
  g.constant = c.number("constant");
  g.power = c.rows<2>("power", "c, t");
  g.einstein = c.rows<2>("einstein", "v, u");
  for (const auto& row : g.einstein)
    if (!(row[1] > 0)) c.fail("einstein", fmt::format("found the temperature u = {}; a number above 0 is wanted", row[1]));
  c.finish();
  return g;
}

/// Density exponents below 0 would diverge in the ideal-gas limit, exponents l and m of an exponential at 0 say nothing.
template <std::size_t N>
void check_exponents(const Cursor& c, std::string_view key, const Rows<N>& rows, std::size_t d_column, std::initializer_list<std::size_t> above_zero) {
  for (std::size_t i = 0; i < rows.size(); ++i) {
    if (rows[i][d_column] < 0) c.fail(key, fmt::format("row {}: found d = {}; an exponent of density not below 0 is wanted", i + 1, rows[i][d_column]));
    for (const auto k : above_zero)
      if (!(rows[i][k] > 0)) c.fail(key, fmt::format("row {}: found {} in column {}; a number above 0 is wanted", i + 1, rows[i][k], k + 1));
  }
}

Terms terms(Cursor& c) {
  Terms t;
  t.power = c.rows<3>("power", "n, t, d");
  t.exponential = c.rows<4>("exponential", "n, t, d, l");
  t.scaled_exponential = c.rows<5>("scaled_exponential", "n, t, d, g, l");
  t.tau_exponential = c.rows<5>("tau_exponential", "n, t, d, l, m");
  t.gaussian = c.rows<7>("gaussian", "n, t, d, eta, epsilon, beta, gamma");
  t.reciprocal_gaussian = c.rows<8>("reciprocal_gaussian", "n, t, d, eta, epsilon, beta, gamma, b");
  t.delta_gaussian = c.rows<7>("delta_gaussian", "n, t, d, eta, epsilon, beta, gamma");
  t.critical_region = c.rows<8>("critical_region", "n, a, b, beta, A, B, C, D");
  check_exponents(c, "power", t.power, 2, {});
  check_exponents(c, "exponential", t.exponential, 2, {3});
  check_exponents(c, "scaled_exponential", t.scaled_exponential, 2, {3, 4});
  check_exponents(c, "tau_exponential", t.tau_exponential, 2, {3, 4});
  check_exponents(c, "gaussian", t.gaussian, 2, {});
  check_exponents(c, "reciprocal_gaussian", t.reciprocal_gaussian, 2, {7});
  check_exponents(c, "delta_gaussian", t.delta_gaussian, 2, {});
  for (const auto& row : t.critical_region)
    if (!(row[3] > 0)) c.fail("critical_region", fmt::format("found beta = {}; a number above 0 is wanted", row[3]));
  if (t.empty()) c.fail("power", "no terms at all; at least one row of some kind is wanted");
  return t;
}

constexpr Bounds relative{0, 1, true, "a relative agreement between 0 and 1"};

CheckState check_state(Cursor c) {
  CheckState s;
  s.source = c.text("source");
  s.note = c.text_or("note");
  s.temperature = c.number("temperature", positive);
  s.density = c.number("density", positive);
  s.pressure = c.optional_number("pressure");
  s.isochoric_heat_capacity = c.optional_number("isochoric_heat_capacity");
  s.isobaric_heat_capacity = c.optional_number("isobaric_heat_capacity");
  s.speed_of_sound = c.optional_number("speed_of_sound");
  s.within = c.number("within", relative);
  if (!s.pressure && !s.isochoric_heat_capacity && !s.isobaric_heat_capacity && !s.speed_of_sound)
    c.fail("pressure", "nothing to check; at least one of pressure, isochoric_heat_capacity, isobaric_heat_capacity, speed_of_sound is wanted");
  c.finish();
  return s;
}

CheckSaturation check_saturation(Cursor c) {
  CheckSaturation s;
  s.source = c.text("source");
  s.note = c.text_or("note");
  s.temperature = c.number("temperature", positive);
  s.pressure = c.optional_number("pressure", positive);
  s.liquid_density = c.optional_number("liquid_density", positive);
  s.vapour_density = c.optional_number("vapour_density", positive);
  s.within = c.number("within", relative);
  if (!s.pressure && !s.liquid_density && !s.vapour_density)
    c.fail("pressure", "nothing to check; at least one of pressure, liquid_density, vapour_density is wanted");
  c.finish();
  return s;
}

Equation equation(Cursor c) {
  Equation e;
  e.name = c.text("name");
  if (const auto kind = c.text("kind"); kind != "helmholtz") c.fail("kind", fmt::format("found \"{}\"; \"helmholtz\" is the kind known", kind));
  e.source = c.text("source");
  e.provenance = c.text_or("provenance");
  e.molar_mass = c.number("molar_mass", {1e-3, 2, false, "a molar mass in kg/mol between 0.001 and 2"});
  e.gas_constant = c.number("gas_constant", {8.31, 8.32, false, "the molar gas constant in J/(mol K), 8.314..."});
  e.reducing_temperature = c.number("reducing_temperature", positive);
  e.reducing_density = c.number("reducing_density", positive);
  auto critical = c.needed_table("critical_point");
  e.critical_point = {critical.number("temperature", positive), critical.number("pressure", positive), critical.number("density", positive)};
  critical.finish();
  e.triple_point_temperature = c.optional_number("triple_point_temperature", positive);
  e.temperature_range = c.range("temperature_range", positive);
  e.maximum_pressure = c.number("maximum_pressure", positive);
  e.ideal_gas = ideal_gas(c.needed_table("ideal_gas"));
  auto residual = c.needed_table("residual");
  e.residual = terms(residual);
  residual.finish();
  if (auto m = c.table("mbwr")) {
    Mbwr raw;
    raw.units = m->text("units");
    raw.gas_constant = m->number("gas_constant", positive);
    raw.critical_density = m->number("critical_density", positive);
    raw.gamma = m->optional_number("gamma", positive);
    raw.b = m->numbers("b");
    if (raw.b.size() != 32) m->fail("b", fmt::format("{} numbers; 32 are wanted", raw.b.size()));
    m->finish();
    e.mbwr = raw;
  }
  for (auto& t : c.tables("check_state", 500)) e.check_states.push_back(check_state(t));
  for (auto& t : c.tables("check_saturation", 500)) e.check_saturations.push_back(check_saturation(t));
  c.finish();
  return e;
}

Safety safety(Cursor c) {
  Safety s;
  s.source = c.text_or("source");
  s.group = c.text_or("group");
  static const std::set<std::string> groups{"", "A1", "A2L", "A2", "A3", "B1", "B2L", "B2", "B3"};
  if (!groups.contains(s.group)) c.fail("group", fmt::format("found \"{}\"; A1, A2L, A2, A3, B1, B2L, B2, B3 or nothing is wanted", s.group));
  s.lfl_volume_percent = c.optional_number("lfl_volume_percent", positive);
  s.lfl_kg_m3 = c.optional_number("lfl_kg_m3", positive);
  s.burning_velocity_cm_s = c.optional_number("burning_velocity_cm_s", positive);
  s.oel_ppm = c.optional_number("oel_ppm", positive);
  s.oel_is_ceiling = c.flag_or("oel_is_ceiling", false);
  s.atel_ppm = c.optional_number("atel_ppm", positive);
  s.rcl_ppm = c.optional_number("rcl_ppm", positive);
  s.rcl_g_m3 = c.optional_number("rcl_g_m3", positive);
  c.finish();
  return s;
}

Environment environment(Cursor c) {
  Environment e;
  e.odp_montreal = c.optional_number("odp_montreal", not_negative);
  e.odp_wmo = c.optional_number("odp_wmo", not_negative);
  const auto below = c.texts("below");
  auto sources = c.table("sources");
  const auto source = [&](std::string_view key) { return sources ? sources->text_or(key) : std::string(); };
  const auto gwp = [&](std::string_view key) -> std::optional<Gwp> {
    const auto v = c.optional_number(key, not_negative);
    const auto from = source(key);
    if (!v) return std::nullopt;
    return Gwp{*v, std::find(below.begin(), below.end(), key) != below.end(), from};
  };
  e.ar4 = gwp("gwp100_ar4");
  e.ar5 = gwp("gwp100_ar5");
  e.ar6 = gwp("gwp100_ar6");
  e.eu_2024_573 = gwp("gwp100_eu_2024_573");
  source("odp_montreal");
  source("odp_wmo");
  if (sources) sources->finish();
  for (const auto& key : below)
    if (!c.has(key)) c.fail("below", fmt::format("names \"{}\", which is not in this table", key));
  c.finish();
  return e;
}

Constants constants(Cursor c) {
  Constants k;
  k.source = c.text_or("source");
  k.critical_temperature = c.optional_number("critical_temperature", positive);
  k.critical_pressure = c.optional_number("critical_pressure", positive);
  k.critical_density = c.optional_number("critical_density", positive);
  k.triple_point_temperature = c.optional_number("triple_point_temperature", positive);
  k.acentric_factor = c.optional_number("acentric_factor", {-1, 3, false, "an acentric factor between -1 and 3"});
  k.normal_boiling_point = c.optional_number("normal_boiling_point", positive);
  k.normal_boiling_point_celsius = c.optional_number("normal_boiling_point_celsius", {-273.15, 1000, false, "a temperature in degrees Celsius"});
  c.finish();
  return k;
}

PairKind pair_kind(Cursor& c) {
  const auto text = c.text("kind");
  if (text == "published") return PairKind::published;
  if (text == "fitted") return PairKind::fitted;
  if (text == "fitted-weak") return PairKind::fitted_weak;
  if (text == "estimated") return PairKind::estimated;
  c.fail("kind", fmt::format("found \"{}\"; published, fitted, fitted-weak or estimated is wanted", text));
}

}  // namespace

Compound parse_compound(std::string_view text, const std::string& name) {
  const auto table = parse(text, name);
  Cursor top(table, name, "");
  Compound c;
  c.file = name;
  auto id = top.needed_table("identity");
  c.designation = id.text("designation");
  if (name_key(c.designation).empty()) id.fail("designation", fmt::format("found \"{}\"; a designation with letters or digits is wanted", c.designation));
  c.chemical_name = id.text("chemical_name");
  c.formula = id.text("formula");
  c.cas = id.text_or("cas");
  c.molar_mass = id.number("molar_mass", {1e-3, 2, false, "a molar mass in kg/mol between 0.001 and 2"});
  c.series = id.text_or("series");
  c.in_ashrae_34 = id.flag_or("in_ashrae_34", false);
  c.aliases = id.texts("aliases");
  c.uncertain = id.texts("uncertain");
  c.note = id.text_or("note");
  id.finish();
  if (const auto t = top.table("safety")) c.safety = safety(*t);
  if (const auto t = top.table("environment")) c.environment = environment(*t);
  if (const auto t = top.table("constants")) c.constants = constants(*t);
  if (const auto t = top.table("ideal_gas")) c.ideal_gas = ideal_gas(*t);
  std::set<std::string> names;
  for (auto& t : top.tables("equation", 20)) {
    auto e = equation(t);
    if (!names.insert(e.name).second) t.fail("name", fmt::format("\"{}\" stands twice; each equation wants a name of its own", e.name));
    if (std::abs(e.molar_mass / c.molar_mass - 1) > 2e-3)
      t.fail("molar_mass", fmt::format("found {} kg/mol, but identity.molar_mass is {}; the two may differ by 0.2 %", e.molar_mass, c.molar_mass));
    c.equations.push_back(std::move(e));
  }
  top.finish();
  return c;
}

PairFile parse_pairs(std::string_view text, const std::string& name) {
  const auto table = parse(text, name);
  Cursor top(table, name, "");
  PairFile file;
  auto sources = top.table("sources");
  std::set<std::string> used_sources;
  std::set<std::pair<std::string, std::string>> seen;
  for (auto& c : top.tables("pair", 20000)) {
    Pair p;
    const auto fluids = c.texts("fluids");
    if (fluids.size() != 2 || name_key(fluids[0]) == name_key(fluids[1])) c.fail("fluids", "two different designations are wanted");
    p.first = fluids[0];
    p.second = fluids[1];
    if (!seen.insert(std::minmax(name_key(p.first), name_key(p.second))).second)
      c.fail("fluids", fmt::format("the pair {} / {} stands twice; one row is wanted", p.first, p.second));
    constexpr Bounds near_one{0.1, 10, false, "a number between 0.1 and 10"};
    p.beta_T = c.number("beta_T", near_one);
    p.gamma_T = c.number("gamma_T", near_one);
    p.beta_v = c.number("beta_v", near_one);
    p.gamma_v = c.number("gamma_v", near_one);
    p.F = c.number_or("F", 0.0);
    p.departure = c.text_or("departure");
    p.kind = pair_kind(c);
    p.gamma_T_uncertainty = c.optional_number("gamma_T_uncertainty", not_negative);
    p.zeta = c.optional_number("zeta");
    p.xi = c.optional_number("xi");
    p.provenance = c.text_or("provenance");
    const auto source = c.text("source");
    if (!sources || !sources->has(source)) c.fail("source", fmt::format("found \"{}\"; a key of [sources] is wanted", source));
    p.source = sources->text(source);
    c.finish();
    file.pairs.push_back(std::move(p));
  }
  if (auto e = top.table("estimation")) {
    auto& r = file.estimation;
    r.beta_T = e->number_or("beta_T", 1);
    r.beta_v = e->number_or("beta_v", 1);
    r.gamma_T = e->number_or("gamma_T", 1);
    r.F = e->number_or("F", 0);
    r.gamma_v_rule = e->text_or("gamma_v_rule", "half-way");
    if (r.gamma_v_rule != "half-way") e->fail("gamma_v_rule", fmt::format("found \"{}\"; \"half-way\" is the rule known", r.gamma_v_rule));
    r.published_rules = e->text_or("published_rules");
    for (auto& c : e->tables("classes", 100)) {
      r.classes.push_back({c.text("what"), c.texts("first"), c.texts("second"), c.number("gamma_T", positive), c.number("spread", not_negative)});
      c.finish();
    }
    e->finish();
  }
  if (sources)
    for (const auto& [key, node] : *table["sources"].as_table()) sources->text(key.str());
  top.finish();
  return file;
}

std::vector<Departure> parse_departures(std::string_view text, const std::string& name) {
  const auto table = parse(text, name);
  Cursor top(table, name, "");
  std::vector<Departure> r;
  std::set<std::string> names;
  for (auto& c : top.tables("departure", 1000)) {
    Departure d;
    d.name = c.text("name");
    if (!names.insert(d.name).second) c.fail("name", fmt::format("\"{}\" stands twice; each departure function wants a name of its own", d.name));
    d.source = c.text("source");
    d.terms = terms(c);
    c.finish();
    r.push_back(std::move(d));
  }
  top.finish();
  return r;
}

std::vector<Blend> parse_blends(std::string_view text, const std::string& name) {
  const auto table = parse(text, name);
  Cursor top(table, name, "");
  const auto source = top.text_or("source");
  std::vector<Blend> r;
  std::set<std::string> names;
  for (auto& c : top.tables("blend", 5000)) {
    Blend b;
    b.source = source;
    b.designation = c.text("designation");
    if (!names.insert(name_key(b.designation)).second) c.fail("designation", fmt::format("\"{}\" stands twice; one row is wanted", b.designation));
    b.series = c.text_or("series");
    b.components = c.texts("components");
    b.mass_percent = c.numbers("mass_percent", positive);
    if (b.components.empty()) c.fail("components", "none; at least one is wanted");
    if (b.mass_percent.size() != b.components.size()) c.fail("mass_percent", fmt::format("{} figures for {} components; one for each is wanted", b.mass_percent.size(), b.components.size()));
    double sum = 0;
    for (const double w : b.mass_percent) sum += w;
    if (std::abs(sum - 100) > 1e-6) c.fail("mass_percent", fmt::format("the figures add to {}; 100 is wanted", sum));
    std::set<std::string> parts;
    for (const auto& p : b.components)
      if (!parts.insert(name_key(p)).second) c.fail("components", fmt::format("\"{}\" stands twice; each component once is wanted", p));
    b.tolerance_plus = c.numbers("tolerance_plus", not_negative);
    b.tolerance_minus = c.numbers("tolerance_minus", not_negative);
    for (const auto* key : {"tolerance_plus", "tolerance_minus"}) {
      const auto n = (key == std::string_view("tolerance_plus") ? b.tolerance_plus : b.tolerance_minus).size();
      if (n != 0 && n != b.components.size()) c.fail(key, fmt::format("{} figures for {} components; one for each, or none, is wanted", n, b.components.size()));
    }
    b.safety_group = c.text_or("safety_group");
    constexpr Bounds celsius{-273.15, 1000, false, "a temperature in degrees Celsius"};
    b.normal_bubble_point_celsius = c.optional_number("normal_bubble_point_celsius", celsius);
    b.normal_dew_point_celsius = c.optional_number("normal_dew_point_celsius", celsius);
    b.molar_mass = c.optional_number("molar_mass", positive);
    b.azeotropic_temperature_celsius = c.optional_number("azeotropic_temperature_celsius", celsius);
    b.uncertain = c.texts("uncertain");
    b.note = c.text_or("note");
    c.finish();
    r.push_back(std::move(b));
  }
  top.finish();
  return r;
}

std::vector<Caution> parse_cautions(std::string_view text, const std::string& name) {
  const auto table = parse(text, name);
  Cursor top(table, name, "");
  top.text_or("source");
  std::vector<Caution> r;
  std::set<std::string> names;
  for (auto& c : top.tables("caution", 500)) {
    Caution k{c.text("name"), c.text("topic"), c.text("when"), c.text("short"), c.text("text")};
    if (!names.insert(k.name).second) c.fail("name", fmt::format("\"{}\" stands twice; each caution wants a name of its own", k.name));
    c.finish();
    r.push_back(std::move(k));
  }
  top.finish();
  return r;
}

Compound read_compound(const std::filesystem::path& file) { return parse_compound(slurp(file), file.string()); }
PairFile read_pairs(const std::filesystem::path& file) { return parse_pairs(slurp(file), file.string()); }
std::vector<Departure> read_departures(const std::filesystem::path& file) { return parse_departures(slurp(file), file.string()); }
std::vector<Blend> read_blends(const std::filesystem::path& file) { return parse_blends(slurp(file), file.string()); }
std::vector<Caution> read_cautions(const std::filesystem::path& file) { return parse_cautions(slurp(file), file.string()); }

}  // namespace zeotrope::data
