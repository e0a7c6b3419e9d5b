#include "zeotrope/units.hpp"

#include <fmt/format.h>

#include <charconv>
#include <system_error>

namespace zeotrope::units {

namespace {

/// Lower case, blanks and degree signs dropped, "deg" prefix kept for the caller.
std::string fold(std::string_view text) {
  std::string r;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const char c = text[i];
    if (c == ' ' || c == '\t' || c == '_') continue;
    if (c == '\xc2' && i + 1 < text.size() && text[i + 1] == '\xb0') {  // U+00B0 in UTF-8
      ++i;
      continue;
    }
    r += c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
  }
  return r;
}

struct Quantity {
  double value;
  std::string_view unit;
};

Quantity split(std::string_view text, std::string_view what) {
  const auto start = text.find_first_not_of(" \t");
  if (start == std::string_view::npos) throw BadInput(fmt::format("{}: found nothing; a figure with its unit is wanted", what));
  text.remove_prefix(start);
  if (text.front() == '+') text.remove_prefix(1);
  double value = 0;
  const auto [end, fault] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (fault != std::errc() || !std::isfinite(value)) throw BadInput(fmt::format("{}: found \"{}\"; a figure with its unit is wanted", what, text.substr(0, 40)));
  text.remove_prefix(static_cast<std::size_t>(end - text.data()));
  const auto unit_start = text.find_first_not_of(" \t");
  if (unit_start == std::string_view::npos) throw BadInput(fmt::format("{}: found the figure {} without a unit", what, value));
  return {value, text.substr(unit_start)};
}

}  // namespace

double atmosphere_at_altitude(double metres) {
  if (!(metres >= -1000 && metres <= 11000)) throw BadInput(fmt::format("altitude: found {} m; -1000 m to 11000 m is the range of the ICAO troposphere", metres));
  return standard_atmosphere * std::pow(1 - 2.25577e-5 * metres, 5.25588);
}

double to_pascal(double value, Pressure u, double ambient) {
  const auto& p = unit(u);
  double r = value * p.pascals + (p.gauge ? ambient : 0.0);
  if (u == Pressure::inhg_vacuum) r = ambient - value * p.pascals;
  if (!(r >= 0) || !std::isfinite(r)) throw BadInput(fmt::format("pressure: {} {} is {:.6g} Pa absolute; a figure not below perfect vacuum is wanted", value, p.label, r));
  return r;
}

double from_pascal(double pascal, Pressure u, double ambient) {
  const auto& p = unit(u);
  if (u == Pressure::inhg_vacuum) return (ambient - pascal) / p.pascals;
  return (pascal - (p.gauge ? ambient : 0.0)) / p.pascals;
}

double to_kelvin(double value, Temperature u) {
  double r = value;
  if (u == Temperature::celsius) r = value + 273.15;
  if (u == Temperature::fahrenheit) r = (value + 459.67) / 1.8;
  if (!(r > 0) || !std::isfinite(r)) throw BadInput(fmt::format("temperature: {} {} is {:.6g} K; a figure above absolute zero is wanted", value, label(u), r));
  return r;
}

double from_kelvin(double kelvin, Temperature u) {
  if (u == Temperature::celsius) return kelvin - 273.15;
  if (u == Temperature::fahrenheit) return kelvin * 1.8 - 459.67;
  return kelvin;
}

double difference_from_kelvin(double kelvin, Temperature u) { return u == Temperature::fahrenheit ? kelvin * 1.8 : kelvin; }
double difference_to_kelvin(double value, Temperature u) { return u == Temperature::fahrenheit ? value / 1.8 : value; }

Pressure parse_pressure_unit(std::string_view text) {
  const auto wanted = fold(text);
  std::string known;
  for (const auto& u : pressure_units) {
    for (const auto s : u.spellings)
      if (!s.empty() && s == wanted) return u.id;
    known += fmt::format("{}{}", known.empty() ? "" : ", ", u.label);
  }
  if (wanted == "psi" || wanted == "bar")
    throw BadInput(fmt::format("pressure unit \"{}\" does not say gauge or absolute; {} is wanted", text, wanted == "psi" ? "psig or psia" : "bar(g) or bar(a)"));
  throw BadInput(fmt::format("pressure unit: found \"{}\"; one of {} is wanted", text.substr(0, 40), known));
}

Temperature parse_temperature_unit(std::string_view text) {
  auto t = fold(text);
  if (t.starts_with("deg")) t.erase(0, 3);
  if (t == "k" || t == "kelvin") return Temperature::kelvin;
  if (t == "c" || t == "celsius") return Temperature::celsius;
  if (t == "f" || t == "fahrenheit") return Temperature::fahrenheit;
  throw BadInput(fmt::format("temperature unit: found \"{}\"; K, C or F is wanted", text.substr(0, 40)));
}

double parse_pressure(std::string_view text, double ambient) {
  const auto q = split(text, "pressure");
  return to_pascal(q.value, parse_pressure_unit(q.unit), ambient);
}

double parse_temperature(std::string_view text) {
  const auto q = split(text, "temperature");
  return to_kelvin(q.value, parse_temperature_unit(q.unit));
}

double parse_temperature_difference(std::string_view text) {
  const auto q = split(text, "temperature difference");
  const auto k = difference_to_kelvin(q.value, parse_temperature_unit(q.unit));
  if (!std::isfinite(k)) throw BadInput(fmt::format("temperature difference: found \"{}\"; a finite figure is wanted", text.substr(0, 40)));
  return k;
}

}  // namespace zeotrope::units
