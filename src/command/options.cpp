#include "options.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>

namespace zeotrope::command {

namespace {

/// Air pressure from the Dead Sea to the top of the troposphere; outside it a unit was mistaken.
constexpr double lowest_air = 20e3, highest_air = 115e3;  // Pa
constexpr double foot = 0.3048;                           // m, exact

std::string_view trim(std::string_view s) {
  const auto a = s.find_first_not_of(" \t");
  if (a == std::string_view::npos) return {};
  return s.substr(a, s.find_last_not_of(" \t") - a + 1);
}

struct Figure {
  double value;
  std::string_view unit;
};

Figure split(const std::string& option, std::string_view text, const std::string& wanted) {
  auto s = trim(text);
  if (s.starts_with('+')) s.remove_prefix(1);
  double value = 0;
  const auto [end, fault] = std::from_chars(s.data(), s.data() + s.size(), value);
  if (fault != std::errc() || !std::isfinite(value)) throw BadInput(fmt::format("{}: found \"{}\"; {} is wanted", option, text.substr(0, 40), wanted));
  const auto unit = trim(s.substr(static_cast<std::size_t>(end - s.data())));
  if (unit.starts_with(',')) throw BadInput(fmt::format("{}: found \"{}\"; a decimal point, not a comma, is wanted", option, text.substr(0, 40)));
  return {value, unit};
}

/// Runs a call of the library and puts the option before its message, in place of the quantity.
template <class Call>
auto named(const std::string& option, Call&& call) {
  try {
    return call();
  } catch (const BadInput& e) {
    std::string_view message = e.what();
    for (const std::string_view quantity : {"pressure unit: ", "temperature unit: ", "pressure: ", "temperature: ", "altitude: "})
      if (message.starts_with(quantity)) {
        message.remove_prefix(quantity.size());
        break;
      }
    throw BadInput(fmt::format("{}: {}", option, message));
  }
}

std::string lower(std::string_view s) {
  std::string r(s);
  for (auto& c : r)
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  return r;
}

Ambient from_altitude(const std::string& text) {
  const auto f = split("--altitude", text, "metres above the sea, e.g. 1600, or feet with ft");
  const auto unit = lower(f.unit);
  if (!unit.empty() && unit != "m" && unit != "ft") throw BadInput(fmt::format("--altitude: found the unit \"{}\"; m or ft is wanted", f.unit.substr(0, 40)));
  const double pascal = named("--altitude", [&] { return units::atmosphere_at_altitude(unit == "ft" ? f.value * foot : f.value); });
  return {pascal, fmt::format("{:.10g} {} above the sea, {:.3f} kPa by the standard atmosphere", f.value, unit == "ft" ? "ft" : "m", pascal / 1e3)};
}

Ambient from_barometer(const std::string& text) {
  const std::string wanted = "an absolute pressure, e.g. \"98.2 kPa\", \"982 hPa\" or \"29.0 inHg\",";
  const auto f = split("--barometer", text, wanted);
  const auto unit = lower(f.unit);
  if (unit.empty()) throw BadInput(fmt::format("--barometer: found \"{}\" without a unit; {} is wanted", text.substr(0, 40), wanted));
  double pascal = 0;
  if (unit == "inhg")
    pascal = f.value * units::inch_of_mercury;  // a barometer counts from zero, not downward from the air
  else if (unit == "hpa" || unit == "mbar")
    pascal = f.value * 100;
  else {
    const auto id = named("--barometer", [&] { return units::parse_pressure_unit(f.unit); });
    if (units::unit(id).gauge) throw BadInput(fmt::format("--barometer: found \"{}\"; {} is wanted", text.substr(0, 40), wanted));
    pascal = named("--barometer", [&] { return units::to_pascal(f.value, id); });
  }
  if (!(pascal >= lowest_air && pascal <= highest_air))
    throw BadInput(
        fmt::format("--barometer: \"{}\" is {:.6g} kPa; the air has {:g} to {:g} kPa", text.substr(0, 40), pascal / 1e3, lowest_air / 1e3, highest_air / 1e3));
  return {pascal, fmt::format("by barometer, {:.3f} kPa", pascal / 1e3)};
}

}  // namespace

void RefrigerantChoice::add_to(CLI::App& app) {
  app.add_option("REFRIGERANT", words, "designation or name (R-454B, 454b, propane), or a recipe (\"R-32 68.9 + R-1234yf 31.1\")")->required()->type_name("");
  app.add_flag("--mole", mole, "the figures of the recipe are by mole, not by mass");
  app.add_flag("--normalise", normalise, "scale a recipe that does not add to 100 (or 1)");
}

Refrigerant RefrigerantChoice::make(const data::Catalogue& catalogue) const {
  std::string text;
  for (const auto& w : words) text += (text.empty() ? "" : " ") + w;
  if (text.find_first_not_of(" \t") == std::string::npos) throw BadInput("no refrigerant given; a designation, a name or a recipe is wanted");
  if (text.find('+') == std::string::npos && (mole || normalise))
    throw BadInput(
        fmt::format("{} belongs to a recipe such as \"R-32 68.9 + R-1234yf 31.1\"; found \"{}\"", mole ? "--mole" : "--normalise", text.substr(0, 64)));
  BlendOptions options;
  options.basis = mole ? Basis::mole : Basis::mass;
  options.normalise = normalise;
  try {
    return parse_refrigerant(text, options, catalogue);
  } catch (const BadInput& e) {
    const std::string message = e.what();
    if (message.find("normalised") == std::string::npos) throw;
    throw BadInput(message + " with --normalise");
  }
}

void AmbientChoice::add_to(CLI::App& app) {
  app.add_option("--altitude", altitude, "height of the gauge above the sea, m (or \"5280 ft\")")->type_name("METRES");
  app.add_option("--barometer", barometer, "air pressure at the gauge, not reduced to sea level (\"98.2 kPa\")")->type_name("PRESSURE");
}

Ambient AmbientChoice::resolve() const {
  if (!altitude.empty() && !barometer.empty()) throw BadInput("--altitude and --barometer: only one of them is wanted");
  if (!altitude.empty()) return from_altitude(altitude);
  if (!barometer.empty()) return from_barometer(barometer);
  return {};
}

void UnitChoice::add_to(CLI::App& app, const std::string& temperature_note, const std::string& pressure_note) {
  app.add_option("--temperature-unit", temperature, "C, F or K; " + temperature_note)->type_name("UNIT");
  app.add_option("--pressure-unit", pressure, "one or more, by commas or repeated (listed below); " + pressure_note)
      ->type_name("UNIT")
      ->allow_extra_args(false);
}

std::string pressure_units_line() {
  std::string known;
  for (const auto& u : units::pressure_units) known += (known.empty() ? "" : ", ") + std::string(u.label);
  return "\n\nPressure units: " + known + ".";
}

units::Temperature UnitChoice::temperature_or(units::Temperature otherwise) const {
  if (temperature.empty()) return otherwise;
  return named("--temperature-unit", [&] { return units::parse_temperature_unit(temperature); });
}

std::vector<units::Pressure> UnitChoice::pressure_or(std::vector<units::Pressure> otherwise) const {
  if (pressure.empty()) return otherwise;
  std::vector<units::Pressure> r;
  for (const auto& list : pressure)
    for (std::size_t at = 0; at <= list.size();) {
      const auto end = std::min(list.find(',', at), list.size());
      const auto one = trim(std::string_view(list).substr(at, end - at));
      const auto id = named("--pressure-unit", [&] { return units::parse_pressure_unit(one); });
      if (std::find(r.begin(), r.end(), id) == r.end()) r.push_back(id);
      at = end + 1;
    }
  return r;
}

EnteredPressure entered_pressure(const std::string& option, std::string_view text, double ambient) {
  const std::string wanted = "a pressure with its unit, e.g. \"118 psig\" or \"8.1 bar(g)\",";
  const auto f = split(option, text, wanted);
  if (f.unit.empty()) throw BadInput(fmt::format("{}: found \"{}\" without a unit; {} is wanted", option, text.substr(0, 40), wanted));
  const auto id = named(option, [&] { return units::parse_pressure_unit(f.unit); });
  return {named(option, [&] { return units::to_pascal(f.value, id, ambient); }), id};
}

EnteredTemperature entered_temperature(const std::string& option, std::string_view text) {
  const std::string wanted = "a temperature with its unit, e.g. 5C, 41F or 278.15K,";
  const auto f = split(option, text, wanted);
  if (f.unit.empty()) throw BadInput(fmt::format("{}: found \"{}\" without a unit; {} is wanted", option, text.substr(0, 40), wanted));
  const auto id = named(option, [&] { return units::parse_temperature_unit(f.unit); });
  return {named(option, [&] { return units::to_kelvin(f.value, id); }), id};
}

double entered_number(const std::string& option, std::string_view text, const std::string& wanted) {
  const auto f = split(option, text, wanted);
  if (!f.unit.empty()) throw BadInput(fmt::format("{}: found \"{}\"; {} is wanted", option, text.substr(0, 40), wanted));
  return f.value;
}

}  // namespace zeotrope::command
