#include "zeotrope/refrigerant.hpp"

#include <fmt/format.h>

#include <cmath>
#include <mutex>
#include <utility>

#include "zeotrope/equation/properties.hpp"
#include "zeotrope/error.hpp"
#include "zeotrope/phase/phase_boundary.hpp"
#include "zeotrope/phase/pure_saturation.hpp"

namespace zeotrope {

namespace {

struct Offset {
  double enthalpy = 0, entropy = 0;
};
void positive(const char* what, double value, const char* unit) {
  if (!(std::isfinite(value) && value > 0)) throw BadInput(fmt::format("{}: found {} {}; a number above 0 is wanted", what, value, unit));
}

}  // namespace

struct Refrigerant::Self {
  std::string name;
  std::vector<Component> components;
  std::vector<data::Pair> pairs;
  std::vector<std::shared_ptr<const data::Departure>> departures;
  std::shared_ptr<const data::Blend> designated;
  ReferenceState reference;
  Eigen::VectorXd x, molar_masses;
  double molar_mass = 0;
  Range range;
  std::vector<const data::IdealGas*> gases;
  equation::MultiFluid model;  // made last: filling it fills what stands above

  mutable std::once_flag pure_once, bubble_once, dew_once, offset_once;
  mutable phase::PureCritical critical{};
  mutable std::optional<phase::PhaseBoundary> bubble, dew;
  mutable Offset offset;

  Self(std::string name_, std::vector<std::shared_ptr<const data::Compound>> compounds, const std::vector<double>& fractions, Basis basis, std::vector<data::Pair> pairs_,
       std::vector<std::shared_ptr<const data::Departure>> departures_, std::shared_ptr<const data::Blend> designated_, ReferenceState reference_)
      : name(std::move(name_)), pairs(std::move(pairs_)), departures(std::move(departures_)), designated(std::move(designated_)), reference(reference_), model(make(std::move(compounds), fractions, basis)) {}

  equation::MultiFluid make(std::vector<std::shared_ptr<const data::Compound>> compounds, const std::vector<double>& fractions, Basis basis) {
    const auto n = compounds.size();
    if (n == 0 || fractions.size() != n) throw BadInput(fmt::format("{}: {} fractions for {} components", name, fractions.size(), n));
    if (pairs.size() != n * (n - 1) / 2) throw BadInput(fmt::format("{}: {} pairs for {} components; {} are wanted", name, pairs.size(), n, n * (n - 1) / 2));
    std::vector<equation::MultiFluid::Component> parts;
    x.resize(static_cast<Eigen::Index>(n));
    molar_masses.resize(x.size());
    for (std::size_t i = 0; i < n; ++i) {
      if (compounds[i]->equations.empty())
        throw BadInput(fmt::format("{}: {} has no Helmholtz equation in the coefficient files; only its constants are known", name, compounds[i]->designation));
      const auto& e = compounds[i]->equations.front();
      parts.push_back({&e.residual, e.reducing_temperature, e.reducing_density});
      gases.push_back(&e.ideal_gas);
      molar_masses[static_cast<Eigen::Index>(i)] = e.molar_mass;
      x[static_cast<Eigen::Index>(i)] = basis == Basis::mass ? fractions[i] / e.molar_mass : fractions[i];
      const auto low = e.temperature_range[0], high = e.temperature_range[1];
      if (i == 0 || low > range.lowest_temperature) {
        range.lowest_temperature = low;
        range.lowest_set_by = compounds[i]->designation;
      }
      if (i == 0 || high < range.highest_temperature) {
        range.highest_temperature = high;
        range.highest_set_by = compounds[i]->designation;
      }
      range.highest_pressure = i == 0 ? e.maximum_pressure : std::min(range.highest_pressure, e.maximum_pressure);
    }
    x /= x.sum();
    molar_mass = x.dot(molar_masses);
    for (std::size_t i = 0; i < n; ++i) {
      const auto k = static_cast<Eigen::Index>(i);
      components.push_back({compounds[i], &compounds[i]->equations.front(), x[k], x[k] * molar_masses[k] / molar_mass});
    }
    std::vector<equation::PairTerms> terms;
    for (const auto& p : pairs) {
      equation::PairTerms t{p.beta_T, p.gamma_T, p.beta_v, p.gamma_v, p.F, nullptr};
      if (!p.departure.empty()) {
        for (const auto& d : departures)
          if (d->name == p.departure) t.departure = &d->terms;
        if (t.departure == nullptr) throw BadInput(fmt::format("{}: departure function \"{}\" of the pair {} / {} was not given", name, p.departure, p.first, p.second));
      }
      terms.push_back(t);
    }
    return {n == 1 ? compounds[0]->equations.front().gas_constant : equation::molar_gas_constant, std::move(parts), std::move(terms)};
  }

  bool is_blend() const { return components.size() > 1; }

  const phase::PureCritical& pure_critical() const {
    std::call_once(pure_once, [&] {
      const auto& e = *components.front().equation;
      const auto& c = e.critical_point;
      if (!e.residual.critical_region.empty()) {
        // the terms make this the critical point by construction
        const double p = phase::Isotherm(model, c.temperature, x)(c.density * (1 + 1e-7)).pressure * model.gas_constant() * c.temperature;
        critical = {c.temperature, p, c.density};
      } else {
        critical = phase::pure_critical_point(model, c.temperature, c.density);
      }
    });
    return critical;
  }

  const phase::PhaseBoundary& boundary(phase::Line line) const {
    auto& slot = line == phase::Line::bubble ? bubble : dew;
    std::call_once(line == phase::Line::bubble ? bubble_once : dew_once, [&] {
      // traced below the published range too, for callers who extrapolate
      slot.emplace(model, x, line, 0.8 * range.lowest_temperature);
    });
    return *slot;
  }

  SaturationPoint point(phase::Line line, const SaturationAt& at) const {
    if (at.temperature.has_value() == at.pressure.has_value()) throw BadInput("saturation: exactly one of temperature and pressure is wanted");
    if (at.temperature) positive("temperature", *at.temperature, "K");
    if (at.pressure) positive("pressure", *at.pressure, "Pa");
    const auto& r = range;
    if (at.temperature && *at.temperature < r.lowest_temperature && !at.extrapolate)
      throw OutOfRange(fmt::format("{}: temperature {:.6g} K is below the published range, which starts at {:.6g} K ({})", name, *at.temperature, r.lowest_temperature, r.lowest_set_by));
    SaturationPoint s;
    try {
      s = is_blend() ? blend_point(line, at) : pure_point(at);
    } catch (const NoSolution& e) {
      throw NoSolution(name + ": " + e.what());
    } catch (const NotConverged& e) {
      throw NotConverged(name + ": " + e.what());
    }
    s.extrapolated = s.temperature < r.lowest_temperature * (1 - 1e-12) || s.temperature > r.highest_temperature || s.pressure > r.highest_pressure;
    if (s.extrapolated && !at.extrapolate)
      throw OutOfRange(fmt::format("{}: {} at {:.6g} K and {:.6g} Pa, outside the published range {:.6g} K ({}) to {:.6g} K ({}), up to {:.6g} Pa", name,
                                   line == phase::Line::bubble ? "bubble point" : "dew point", s.temperature, s.pressure, r.lowest_temperature, r.lowest_set_by, r.highest_temperature, r.highest_set_by,
                                   r.highest_pressure));
    return s;
  }

  SaturationPoint pure_point(const SaturationAt& at) const {
    const auto& c = pure_critical();
    const auto solve = [&] {
      if (at.temperature) return phase::pure_saturation(model, c, *at.temperature);
      const double lowest = range.lowest_temperature;
      // the widened search only where it is needed: an equation may fail well below its range
      const bool below = at.extrapolate && *at.pressure < phase::pure_saturation(model, c, lowest).pressure;
      return phase::pure_saturation_at_pressure(model, c, (below ? 0.8 : 1.0) * lowest, *at.pressure);
    };
    const auto s = solve();
    return {s.temperature, s.pressure, phase_of(s.liquid_density, x), phase_of(s.vapour_density, x), s.fugacity_mismatch, false};
  }

  SaturationPoint blend_point(phase::Line line, const SaturationAt& at) const {
    const auto& b = boundary(line);
    const auto p = at.temperature ? b.at_temperature(*at.temperature) : b.at_pressure(*at.pressure);
    const Phase feed = phase_of(p.feed_density, x);
    const Phase other = phase_of(p.other.sum(), p.other / p.other.sum());
    const bool bubble = line == phase::Line::bubble;
    return {p.temperature, p.pressure, bubble ? feed : other, bubble ? other : feed, p.fugacity_mismatch, false};
  }

  Phase phase_of(double molar_density, const Eigen::VectorXd& x) const {
    const double M = x.dot(molar_masses);
    return {molar_density * M, molar_density, x, x.cwiseProduct(molar_masses) / M};
  }

  equation::MolarProperties raw(double temperature, double molar_density, const Eigen::VectorXd& x) const {
    return equation::properties(model, gases, temperature, molar_density, x, x.dot(molar_masses));
  }

  const Offset& reference_offset() const {
    std::call_once(offset_once, [&] {
      const auto& r = reference;
      double T = r.temperature, rho = r.molar_density, h = r.enthalpy, s = r.entropy;
      if (r.kind != ReferenceState::Kind::custom) {
        using Kind = ReferenceState::Kind;
        SaturationAt at{.extrapolate = true};
        if (r.kind == Kind::normal_boiling_point)
          at.pressure = 101325.0;
        else
          at.temperature = r.kind == Kind::iir ? 273.15 : 233.15;
        try {
          const auto liquid = point(phase::Line::bubble, at);
          T = liquid.temperature;
          rho = liquid.liquid.molar_density;
        } catch (const Error& e) {
          throw NoSolution(fmt::format("{}: the reference state for enthalpy and entropy (saturated liquid at {}) does not exist; choose another. {}", name,
                                       at.temperature ? fmt::format("{} K", *at.temperature) : "101325 Pa", e.what()));
        }
        h = r.kind == Kind::iir ? 200e3 : 0;
        s = r.kind == Kind::iir ? 1e3 : 0;
      } else {
        positive("reference state: temperature", T, "K");
        positive("reference state: molar density", rho, "mol/m3");
      }
      const auto m = raw(T, rho, x);
      offset = {m.enthalpy / molar_mass - h, m.entropy / molar_mass - s};
    });
    return offset;
  }
};

Refrigerant::Refrigerant(std::string name, std::vector<std::shared_ptr<const data::Compound>> compounds, const std::vector<double>& fractions, Basis basis,
                         std::vector<data::Pair> pairs, std::vector<std::shared_ptr<const data::Departure>> departures, std::shared_ptr<const data::Blend> designated,
                         ReferenceState reference)
    : self_(std::make_shared<Self>(std::move(name), std::move(compounds), fractions, basis, std::move(pairs), std::move(departures), std::move(designated), reference)) {}

const std::string& Refrigerant::name() const { return self_->name; }
const std::vector<Component>& Refrigerant::components() const { return self_->components; }
const Eigen::VectorXd& Refrigerant::mole_fractions() const { return self_->x; }
double Refrigerant::molar_mass() const { return self_->molar_mass; }
const std::shared_ptr<const data::Blend>& Refrigerant::designated() const { return self_->designated; }
const std::vector<data::Pair>& Refrigerant::pairs() const { return self_->pairs; }
const equation::MultiFluid& Refrigerant::model() const { return self_->model; }
const Range& Refrigerant::range() const { return self_->range; }

TwoPhaseTop Refrigerant::top() const {
  if (!is_blend()) {
    const auto& c = self_->pure_critical();
    return {c.temperature, c.pressure, c.density, true, ""};
  }
  const auto& bubble = self_->boundary(phase::Line::bubble);
  if (const auto& c = bubble.critical()) return {c->temperature, c->pressure, c->density, true, ""};
  return {bubble.hottest(), bubble.highest_pressure(), 0, false, bubble.hot_end()};
}

double Refrigerant::hottest(phase::Line line) const { return is_blend() ? self_->boundary(line).hottest() : self_->pure_critical().temperature; }
double Refrigerant::highest_pressure(phase::Line line) const { return is_blend() ? self_->boundary(line).highest_pressure() : self_->pure_critical().pressure; }

Saturation Refrigerant::saturation(const SaturationAt& at) const {
  Saturation s{bubble(at), dew(at)};
  const bool crossed = at.temperature ? s.bubble.pressure < s.dew.pressure * (1 - 1e-8) : s.bubble.temperature > s.dew.temperature * (1 + 1e-9);
  if (crossed)
    throw NotConverged(fmt::format("{}: the bubble point ({:.6g} K, {:.6g} Pa) lies on the wrong side of the dew point ({:.6g} K, {:.6g} Pa): by the model the liquid would split into two liquids, which is not solved",
                                   name(), s.bubble.temperature, s.bubble.pressure, s.dew.temperature, s.dew.pressure));
  return s;
}

SaturationPoint Refrigerant::bubble(const SaturationAt& at) const { return self_->point(phase::Line::bubble, at); }
SaturationPoint Refrigerant::dew(const SaturationAt& at) const { return self_->point(phase::Line::dew, at); }

double Refrigerant::glide(double pressure, bool extrapolate) const {
  if (!is_blend()) return 0;
  const auto s = saturation({.pressure = pressure, .extrapolate = extrapolate});
  return s.dew.temperature - s.bubble.temperature;
}

Properties Refrigerant::properties(double temperature, double molar_density, const Eigen::VectorXd& mole_fractions) const {
  positive("temperature", temperature, "K");
  positive("molar density", molar_density, "mol/m3");
  if (mole_fractions.size() != self_->x.size()) throw BadInput(fmt::format("{}: {} mole fractions for {} components", name(), mole_fractions.size(), self_->x.size()));
  if (!mole_fractions.allFinite() || mole_fractions.minCoeff() < 0 || std::abs(mole_fractions.sum() - 1) > 1e-6)
    throw BadInput(fmt::format("{}: mole fractions that are not below 0 and add to 1 are wanted; these add to {}", name(), mole_fractions.sum()));
  const auto& offset = self_->reference_offset();
  const double M = mole_fractions.dot(self_->molar_masses);
  const auto m = self_->raw(temperature, molar_density, mole_fractions);
  if (!std::isfinite(m.pressure) || !std::isfinite(m.enthalpy) || !std::isfinite(m.isobaric_heat_capacity))
    throw BadInput(fmt::format("{}: the equation has no finite figures at {:.6g} K and {:.6g} mol/m3", name(), temperature, molar_density));
  return {temperature, m.pressure, molar_density * M, m.enthalpy / M - offset.enthalpy, m.entropy / M - offset.entropy, m.isochoric_heat_capacity / M,
          m.isobaric_heat_capacity / M, m.speed_of_sound};
}

}  // namespace zeotrope
