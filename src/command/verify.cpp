#include "zeotrope/apply/verify.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <memory>
#include <set>

#include "command.hpp"
#include "layout.hpp"
#include "zeotrope/data/reader.hpp"
#include "zeotrope/refrigerant.hpp"

namespace zeotrope::command {

namespace {

struct Options {
  std::vector<std::string> names;
  bool all = false, quiet = false, failures = false;
};

using CompoundPtr = std::shared_ptr<const data::Compound>;

struct Subject {
  std::string title;
  CompoundPtr compound;
};

/// In the order asked for, each compound once; a blend stands for its components.
class Subjects {
 public:
  explicit Subjects(const data::Catalogue& catalogue) : catalogue_(catalogue) {}

  void add_file(const std::string& file) {
    if (!std::filesystem::is_regular_file(file)) throw BadInput(fmt::format("verify: there is no file {}", file));
    auto c = std::make_shared<const data::Compound>(data::read_compound(file));
    list_.push_back({printable(file) + ": " + c->designation, c});
  }
  void add_compound(const CompoundPtr& c) {
    if (seen_.insert(c->designation).second) list_.push_back({c->designation, c});
  }
  void add_name(const std::string& name) {
    if (const auto b = catalogue_.find_blend(name))
      for (const auto& component : b->components) add_compound(catalogue_.compound(component));
    else if (const auto c = catalogue_.find_compound(name))
      add_compound(c);
    else
      refrigerant(name, catalogue_);  // throws with suggestions
  }
  void add_all() {
    auto names = catalogue_.compound_designations();
    std::sort(names.begin(), names.end(), natural_less);
    for (const auto& name : names) add_compound(catalogue_.compound(name));
  }
  const std::vector<Subject>& list() const { return list_; }

 private:
  const data::Catalogue& catalogue_;
  std::vector<Subject> list_;
  std::set<std::string> seen_;
};

std::string counted(std::size_t n, const char* what) { return fmt::format("{} {}{}", n, what, n == 1 ? "" : "s"); }

std::string relative(double v) { return fmt::format("{:.1e}", v); }

/// Rows under the source that published them.
std::string rows_text(const std::vector<apply::CheckResult>& results, bool failures_only) {
  std::string text, equation, source;
  Table t("llrrrrl");
  std::vector<std::string> notes;
  const auto flush = [&] {
    if (!t.empty()) text += t.text("    ");
    for (const auto& n : notes) text += wrapped("    note: ", n);
    notes.clear();
    t = Table("llrrrrl");
  };
  for (const auto& c : results) {
    if (failures_only && c.passed) continue;
    if (c.equation != equation || c.source != source) {
      flush();
      if (c.equation != equation) text += "  equation: " + c.equation + "\n";
      text += wrapped("  source: ", c.source);
      t.row({"", "", "computed", "published", "deviation", "within", ""});
      equation = c.equation;
      source = c.source;
    }
    const bool has_figure = c.passed || c.computed != 0;
    t.row({c.what, c.unit, has_figure ? fmt::format("{:.8g}", c.computed) : "none", fmt::format("{:.8g}", c.published), has_figure ? relative(c.deviation) : "",
           relative(c.within), c.passed ? "ok" : "FAILED"});
    if (!c.note.empty() && (notes.empty() || notes.back() != c.what + ": " + c.note)) notes.push_back(c.what + ": " + c.note);
  }
  flush();
  return text;
}

Result run(const Options& o, const data::Catalogue& catalogue) {
  if (o.names.empty() && !o.all) throw BadInput("verify: nothing to verify; names, files ending in .toml, or --all is wanted");
  if (o.quiet && o.failures) throw BadInput("--quiet and --failures: only one of them is wanted");
  Subjects subjects(catalogue);
  for (const auto& name : o.names) name.ends_with(".toml") ? subjects.add_file(name) : subjects.add_name(name);
  if (o.all) subjects.add_all();

  std::string text;
  std::size_t fluids = 0, figures = 0, failed = 0;
  for (const auto& s : subjects.list()) {
    if (s.compound->equations.empty()) {
      if (!o.quiet && !o.failures) text += s.title + ": constants only, no equation to verify\n\n";
      continue;
    }
    const auto results = apply::verify(*s.compound);
    std::size_t bad = 0;
    for (const auto& c : results) bad += c.passed ? 0 : 1;
    ++fluids;
    figures += results.size();
    failed += bad;
    if (o.quiet || (o.failures && bad == 0)) continue;
    text += fmt::format("{}: {}, {}\n", s.title, counted(results.size(), "figure"), bad == 0 ? "all within" : fmt::format("{} FAILED", bad)) +
            rows_text(results, o.failures) + "\n";
  }
  const auto verdict = figures == 0 ? "nothing to verify" : failed == 0 ? "all within their stated agreement" : fmt::format("{} FAILED", failed);
  text += fmt::format("{} of {}: {}\n", counted(figures, "figure"), counted(fluids, "fluid"), verdict);
  return {std::move(text), failed == 0 ? ExitCode::ok : ExitCode::check_failed};
}

constexpr auto examples = R"~(Examples:
  zeotrope verify R-32
  zeotrope verify R-454B            (its components)
  zeotrope verify my-fluid.toml
  zeotrope verify --all --failures
  zeotrope verify --all --quiet

Deviation and within are relative: computed/published - 1, and the agreement that the file states.
The exit code is 4 where a figure is not within.)~";

}  // namespace

Subcommand add_verify(CLI::App& app) {
  auto* sub = app.add_subcommand("verify", "compute the published figures of coefficient files and compare");
  const auto o = std::make_shared<Options>();
  sub->add_option("NAME|FILE.toml", o->names, "fluids, blends (for their components) or coefficient files; quote a name of several words")->type_name("");
  sub->add_flag("--all", o->all, "every fluid that is known");
  sub->add_flag("--quiet", o->quiet, "the summary line only");
  sub->add_flag("--failures", o->failures, "only figures that are not within, and the summary");
  sub->footer(examples);
  return {sub, [o](const data::Catalogue& c) { return run(*o, c); }};
}

}  // namespace zeotrope::command
