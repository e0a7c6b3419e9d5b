#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <memory>

#include "command.hpp"
#include "layout.hpp"
#include "zeotrope/data/names.hpp"
#include "zeotrope/error.hpp"

namespace zeotrope::command {

namespace {

/// What is searched for: start of a designation, a whole alias, formula, component or group, or a part of a name.
struct Filter {
  std::string key, part;

  explicit Filter(const std::string& text) : key(data::name_key(text)) {
    std::transform(text.begin(), text.end(), std::back_inserter(part), [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
  }
  bool all() const { return part.empty(); }
  bool is(const std::string& name) const { return !key.empty() && data::name_key(name) == key; }
  bool starts(const std::string& designation) const { return !key.empty() && data::name_key(designation).starts_with(key); }
  bool within(const std::string& name) const {
    std::string s;
    std::transform(name.begin(), name.end(), std::back_inserter(s), [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
    return part.size() >= 3 && s.find(part) != std::string::npos;
  }
};

bool fits(const data::Compound& c, const Filter& f) {
  return f.all() || f.starts(c.designation) || f.within(c.chemical_name) || f.is(c.formula) || f.is(c.cas) || (c.safety && f.is(c.safety->group)) ||
         std::any_of(c.aliases.begin(), c.aliases.end(), [&](const std::string& a) { return f.is(a); });
}

bool fits(const data::Blend& b, const Filter& f) {
  return f.all() || f.starts(b.designation) || f.is(b.safety_group) || f.is(b.series) ||
         std::any_of(b.components.begin(), b.components.end(), [&](const std::string& c) { return f.is(c); });
}

std::string group(const std::string& g) { return g.empty() ? "-" : g; }

std::string fluids(const data::Catalogue& catalogue, const Filter& filter) {
  auto names = catalogue.compound_designations();
  std::sort(names.begin(), names.end(), natural_less);
  Table t("llll");
  for (const auto& name : names) {
    const auto c = catalogue.compound(name);
    if (!fits(*c, filter)) continue;
    t.row({c->designation, group(c->safety ? c->safety->group : ""), c->chemical_name == c->designation ? c->formula : c->chemical_name + ", " + c->formula,
           c->equations.empty() ? "(constants only, no equation)" : ""});
  }
  return t.text("  ");
}

std::string blends(const data::Catalogue& catalogue, const Filter& filter) {
  auto all = catalogue.blends();
  std::sort(all.begin(), all.end(), [](const auto& a, const auto& b) { return natural_less(a->designation, b->designation); });
  Table t("llll");
  for (const auto& b : all) {
    if (!fits(*b, filter)) continue;
    std::string recipe;
    for (std::size_t i = 0; i < b->components.size(); ++i) recipe += fmt::format("{}{} {:g}", i == 0 ? "" : " + ", b->components[i], b->mass_percent[i]);
    t.row({b->designation, group(b->safety_group), b->series, recipe});
  }
  return t.text("  ");
}

Result run(std::vector<std::string> words, const data::Catalogue& catalogue) {
  const bool only_fluids = !words.empty() && words.front() == "fluids", only_blends = !words.empty() && words.front() == "blends";
  if (only_fluids || only_blends) words.erase(words.begin());
  std::string asked;
  for (const auto& w : words) asked += (asked.empty() ? "" : " ") + w;
  const Filter filter(asked);
  const auto pure = only_blends ? "" : fluids(catalogue, filter), mixed = only_fluids ? "" : blends(catalogue, filter);
  if (pure.empty() && mixed.empty()) {
    std::string near;
    for (const auto& s : catalogue.suggestions(asked)) near += (near.empty() ? "; near to it are: " : ", ") + s;
    throw BadInput(fmt::format("list: {} fits \"{}\"{}",
                               only_blends   ? "no blend"
                               : only_fluids ? "no fluid"
                                             : "no fluid and no blend",
                               asked.substr(0, 64), near));
  }
  std::string text;
  if (!pure.empty()) text += "Fluids: designation, safety group, name, formula\n" + pure;
  if (!mixed.empty()) text += (text.empty() ? "" : "\n") + std::string("Blends: designation, safety group, kind, percent by mass\n") + mixed;
  return {std::move(text)};
}

constexpr auto examples = R"~(Examples:
  zeotrope list
  zeotrope list blends
  zeotrope list 407          (designations that start so)
  zeotrope list blends R-32  (blends with R-32)
  zeotrope list A2L          (a safety group)
  zeotrope list fluids butane)~";

}  // namespace

Subcommand add_list(CLI::App& app) {
  auto* sub = app.add_subcommand("list", "the fluids and blends that are known");
  const auto words = std::make_shared<std::vector<std::string>>();
  sub->add_option("FILTER", *words, "fluids or blends for one kind only, then start of a designation, component, safety group, or part of a name")
      ->type_name("");
  sub->footer(examples);
  return {sub, [words](const data::Catalogue& c) { return run(*words, c); }};
}

}  // namespace zeotrope::command
