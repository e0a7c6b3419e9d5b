#include "zeotrope/apply/verify.hpp"

#include <fmt/format.h>

#include <cmath>
#include <functional>

#include "zeotrope/refrigerant.hpp"

namespace zeotrope::apply {

namespace {

/// The stated normal boiling points are rounded to 1 mK or 10 mK and some belong to measurements, not to the equation.
constexpr double boiling_point_within = 0.02;  // K

void check(std::vector<CheckResult>& out, CheckResult row, const std::function<double()>& compute) {
  try {
    row.computed = compute();
    row.deviation = row.computed / row.published - 1;
    row.passed = std::abs(row.deviation) <= row.within;
  } catch (const Error& e) {
    row.computed = row.deviation = 0;
    row.passed = false;
    row.note += fmt::format("{}{}", row.note.empty() ? "" : "; ", e.what());
  }
  out.push_back(std::move(row));
}

}  // namespace

std::vector<CheckResult> verify(const data::Compound& compound) {
  std::vector<CheckResult> out;
  for (std::size_t k = 0; k < compound.equations.size(); ++k) {
    // each equation in turn as the only one of a fluid
    auto alone = std::make_shared<data::Compound>(compound);
    alone->equations = {compound.equations[k]};
    const auto& e = alone->equations.front();
    // no figure checked here depends on the reference state; one that every fluid has
    const ReferenceState any{ReferenceState::Kind::custom, e.reducing_temperature, 1.0, 0, 0};
    const Refrigerant r(compound.designation, {alone}, {1.0}, Basis::mole, {}, {}, nullptr, any);
    const double M = e.molar_mass;
    const auto row = [&](std::string what, std::string unit, double published, double within, const std::string& source, const std::string& note) {
      return CheckResult{e.name, std::move(what), std::move(unit), published, 0, 0, within, false, source, note};
    };

    const auto& c = e.critical_point;
    check(out, row("temperature of the critical point", "K", c.temperature, 5e-3, e.source, "the equation's own critical point against the stated one"), [&] { return r.top().temperature; });
    check(out, row("pressure of the critical point", "Pa", c.pressure, 1e-2, e.source, "the equation's own critical point against the stated one"), [&] { return r.top().pressure; });
    if (k == 0 && compound.constants.normal_boiling_point) {
      const double T = *compound.constants.normal_boiling_point;
      check(out, row("normal boiling point", "K", T, boiling_point_within / T, e.source, ""), [&] { return r.bubble({.pressure = 101325.0, .extrapolate = true}).temperature; });
    }
    for (const auto& s : e.check_states) {
      const auto where = fmt::format("at {:.8g} K, {:.8g} mol/m3", s.temperature, s.density);
      const auto one = [&](const char* what, const char* unit, const std::optional<double>& published, auto&& pick) {
        if (published)
          check(out, row(fmt::format("{} {}", what, where), unit, *published, s.within, s.source, s.note), [&] { return pick(r.properties(s.temperature, s.density)); });
      };
      one("pressure", "Pa", s.pressure, [](const Properties& p) { return p.pressure; });
      one("isochoric heat capacity", "J/(mol K)", s.isochoric_heat_capacity, [M](const Properties& p) { return p.isochoric_heat_capacity * M; });
      one("isobaric heat capacity", "J/(mol K)", s.isobaric_heat_capacity, [M](const Properties& p) { return p.isobaric_heat_capacity * M; });
      one("speed of sound", "m/s", s.speed_of_sound, [](const Properties& p) { return p.speed_of_sound; });
    }
    for (const auto& s : e.check_saturations) {
      const auto one = [&](const char* what, const char* unit, const std::optional<double>& published, auto&& pick) {
        if (published)
          check(out, row(fmt::format("{} at {:.8g} K", what, s.temperature), unit, *published, s.within, s.source, s.note),
                [&] { return pick(r.bubble({.temperature = s.temperature, .extrapolate = true})); });
      };
      one("saturation pressure", "Pa", s.pressure, [](const SaturationPoint& x) { return x.pressure; });
      one("saturated liquid density", "kg/m3", s.liquid_density, [](const SaturationPoint& x) { return x.liquid.density; });
      one("saturated vapour density", "kg/m3", s.vapour_density, [](const SaturationPoint& x) { return x.vapour.density; });
    }
  }
  return out;
}

}  // namespace zeotrope::apply
