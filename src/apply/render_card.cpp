#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <sstream>

#include "render_parts.hpp"
#include "zeotrope/apply/figures.hpp"
#include "zeotrope/apply/pt_chart.hpp"

namespace zeotrope::apply {

namespace {

using namespace parts;

// The sheet is what A4 and letter have in common inside margins of 10 mm. Heights of text are estimated by wrapping it
// with the widths of Helvetica; the rows of the chart stretch and shrink with what is left, which takes up the error.
constexpr double sheet_width = 190, sheet_height = 257;  // mm
constexpr double column_gap = 5;                         // mm, of text and of blocks
constexpr double column_width = (sheet_width - column_gap) / 2;
constexpr double boxes_width = 68, left_width = sheet_width - boxes_width - 4;  // mm, of the header
constexpr double mm_per_point = 25.4 / 72;
constexpr double small_print = 8;                          // points: nothing is smaller
constexpr double least_figures = 9, largest_figures = 22;  // points
constexpr double narrow_figures = 8;                       // points: where one block must hold very many columns
constexpr double line_spacing = 1.2;
constexpr double digit = 0.575;       // em; 0.556 in Helvetica, with some room for other faces
constexpr double row_spacing = 1.25;  // of a row to its figures
constexpr double least_chart = 45;    // mm
constexpr std::size_t most_blocks = 6;

std::string escaped(std::string_view text) {
  std::string out;
  for (const char c : text) {
    switch (c) {
      case '&':
        out += "&amp;";
        break;
      case '<':
        out += "&lt;";
        break;
      case '>':
        out += "&gt;";
        break;
      case '"':
        out += "&quot;";
        break;
      case '\'':
        out += "&#39;";
        break;
      default:
        out += c;
    }
  }
  return out;
}

/// Text of a paragraph: designations and figures with their unit are not broken at the end of a line.
std::string running(const std::string& text) {
  std::string out;
  std::istringstream words(text);
  for (std::string word; words >> word;) {
    const bool designation = word.find("R-") != std::string::npos,
               unit = word.starts_with("\u00b0") || word == "K" || word == "kPa" || word == "MPa" || word.starts_with("K.");
    if (!out.empty()) out += unit ? "&nbsp;" : " ";
    out += designation ? "<span class=\"whole\">" + escaped(word) + "</span>" : escaped(word);
  }
  return out;
}

/// A minus sign as wide as a digit, for figures; hyphens of names stay.
std::string figure_html(const Cell& cell) {
  if (cell.figure == "-") return "&ndash;";
  if (cell.figure.starts_with('-')) return "&minus;" + escaped(cell.figure.substr(1));
  return escaped(cell.figure);
}

/// Advance width in em of Helvetica and the faces made to its measure; other characters count as wide ones.
double advance(char c) {
  // from ' ' on, in 1/1000 em
  static constexpr int widths[] = {278, 278, 355, 556, 556, 889, 667, 191, 333,  333, 389, 584, 278, 333, 278, 278, 556, 556, 556, 556, 556, 556, 556, 556,
                                   556, 556, 278, 278, 584, 584, 584, 556, 1015, 667, 667, 722, 722, 667, 611, 778, 722, 278, 500, 667, 556, 833, 722, 778,
                                   667, 778, 722, 667, 611, 722, 667, 944, 667,  667, 611, 278, 278, 278, 469, 556, 333, 556, 556, 500, 556, 556, 278, 556,
                                   556, 222, 222, 500, 222, 833, 556, 556, 556,  556, 333, 500, 278, 556, 500, 722, 500, 500, 500, 334, 260, 334, 584};
  const auto byte = static_cast<unsigned char>(c);
  if ((byte & 0xC0U) == 0x80U) return 0;  // continues a character of UTF-8
  if (byte < 32 || byte > 126) return 0.8;
  return widths[byte - 32] / 1000.0;
}

double text_width(std::string_view text, double points) {
  double ems = 0;
  for (const char c : text) ems += advance(c);
  return ems * points * mm_per_point;
}

constexpr double bold = 1.06;  // width of bold text to that of plain

/// Lines that a text takes, wrapped at blanks.
int line_count(const std::string& text, double points, double width, double weight = 1) {
  int lines = 1;
  double used = 0;
  std::istringstream words(text);
  for (std::string word; words >> word;) {
    const double w = text_width(word, points) * weight, blank = text_width(" ", points) * weight;
    if (used > 0 && used + blank + w > width) {
      ++lines;
      used = 0;
    }
    used += (used > 0 ? blank : 0) + w;
    if (used > width) lines += static_cast<int>(used / width);
  }
  return lines;
}

double line_height(double points) { return points * mm_per_point * line_spacing; }

// --- which rows, and how they are laid out ---

struct Layout {
  Rows rows;
  int every = 1;          ///< of the chart's rows
  std::size_t units = 1;  ///< pressure units that fit
  std::size_t blocks = 1, rows_per_block = 1;
  double points = 0;  ///< size of the figures
  double width = 0;   ///< of a block, mm
};

/// Every n-th row, on multiples of the coarser step where the rows lie on multiples of the finer one.
Rows thinned(const PtChart& chart, int every) {
  Rows rows;
  const double step = chart.options.step.value_or(1);
  const auto place = [&](const ChartRow& r) { return r.argument / step; };
  const bool on_multiples = !chart.rows.empty() && std::abs(place(chart.rows.front()) - std::round(place(chart.rows.front()))) < 1e-6;
  for (std::size_t i = 0; i < chart.rows.size(); ++i) {
    const auto index = on_multiples ? std::llround(place(chart.rows[i])) : static_cast<long long>(i);
    if (index % every == 0) rows.push_back(&chart.rows[i]);
  }
  return rows;
}

/// Of the rows without a figure at either end one stays, as the sign that the chart ends there.
Rows trimmed(Rows rows) {
  const auto empty = [](const ChartRow* r) { return !r->blank.empty(); };
  while (rows.size() > 1 && empty(rows[0]) && empty(rows[1])) rows.erase(rows.begin());
  while (rows.size() > 1 && empty(rows[rows.size() - 1]) && empty(rows[rows.size() - 2])) rows.pop_back();
  return rows;
}

/// Head of a column: the argument's by its letter only, for the line above the chart names it.
std::string head_title(const Column& c, const PtChart& chart) {
  if (c.kind != Column::Kind::argument) return c.title;
  return chart.options.by == ChartOptions::By::temperature ? "T" : "p";
}

double head_width(const Column& c, const PtChart& chart) {
  return std::max({text_width(head_title(c, chart), small_print) * bold, text_width(c.phase, small_print) * bold, text_width(c.unit, small_print)}) + 1.5;
}

/// Width that a block needs at a size of figures, mm.
double block_width(const PtChart& chart, const std::vector<Column>& columns, const Rows& rows, double points) {
  double width = 0;
  for (std::size_t i = 0; i < columns.size(); ++i) {
    std::size_t longest = 1;
    for (const auto* r : rows) longest = std::max(longest, length(columns[i].cell(*r).figure));
    const double ems = static_cast<double>(longest) * digit + (i == 0 ? 1.4 : 0.7);
    width += std::max(ems * points * mm_per_point, head_width(columns[i], chart));
  }
  return width;
}

double head_height() { return 3 * small_print * mm_per_point * line_spacing + 1.5; }

/// Largest figures with which the rows fit into the height; 0 points where none of at least `least` do.
Layout fitted(const PtChart& chart, Rows rows, std::size_t units, double height, double least) {
  Layout best;
  best.rows = std::move(rows);
  best.units = units;
  if (best.rows.empty()) return best;
  const auto shown = columns(chart, best.rows, units);
  for (double points = largest_figures; points >= least - 1e-9 && best.points == 0; points -= 0.5) {
    const double width = block_width(chart, shown, best.rows, points);
    const double high = (height - head_height()) / (points * mm_per_point * row_spacing);
    const auto abreast = static_cast<std::size_t>(std::max(0.0, std::floor((sheet_width + column_gap) / (width + column_gap))));
    if (abreast == 0 || high < 1) continue;
    const auto n = (best.rows.size() + static_cast<std::size_t>(high) - 1) / static_cast<std::size_t>(high);
    if (n > std::min(abreast, most_blocks)) continue;
    best.points = points;
    best.blocks = n;
    best.rows_per_block = (best.rows.size() + n - 1) / n;
    // blocks that are much wider than they need part the figures from their arguments
    best.width = std::min((sheet_width - column_gap * static_cast<double>(n - 1)) / static_cast<double>(n), 1.6 * width);
  }
  return best;
}

Layout lay_out(const PtChart& chart, double height) {
  static constexpr int steps[] = {1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10000, 20000};
  height = std::max(height, least_chart);
  const auto fewest = std::min<std::size_t>(10, chart.rows.size());
  // a pressure unit more is worth less than rows: thin down to a few rows, then small figures, then fewer units
  for (std::size_t units = chart.options.pressure_units.size(); units > 0; --units)
    for (const double least : {least_figures, narrow_figures})
      for (const int every : steps) {
        auto rows = trimmed(thinned(chart, every));
        if (every > 1 && rows.size() < fewest) break;
        auto layout = fitted(chart, std::move(rows), units, height, least);
        if (layout.points == 0) continue;
        layout.every = every;
        return layout;
      }
  for (const int every : steps) {
    auto layout = fitted(chart, trimmed(thinned(chart, every)), 1, height, narrow_figures);
    layout.every = every;
    if (layout.points > 0) return layout;
  }
  throw BadInput(fmt::format("chart of {}: its figures do not fit on one sheet", chart.identity.name));
}

// --- texts ---

struct Notes {
  std::vector<std::string> lines;
  std::string estimated;
};

/// Pairs by kind: named while they are few or weak, else counted.
std::string pair_kinds(const Identification& id) {
  constexpr std::size_t most_named = 6;
  std::string text;
  for (const auto kind : {data::PairKind::published, data::PairKind::fitted, data::PairKind::fitted_weak}) {
    std::vector<std::string> names;
    for (const auto& p : id.pairs)
      if (p.kind == kind) names.push_back(p.first + " / " + p.second);
    if (names.empty()) continue;
    const bool named = id.pairs.size() <= most_named || (kind == data::PairKind::fitted_weak && names.size() <= most_named);
    text += fmt::format("{}{}: {}", text.empty() ? "" : "; ", in_words(kind),
                        named ? fmt::format("{}", fmt::join(names, ", ")) : fmt::format("{} pairs", names.size()));
  }
  if (!estimated_words(id, false).empty()) text += text.empty() ? "all estimated, see the box" : "; the others estimated, see the box";
  return text;
}

std::string sources(const Identification& id) {
  std::string text = "Sources of the equations: ";
  for (std::size_t i = 0; i < id.parts.size(); ++i) text += fmt::format("{}{}: {}", i ? "; " : "", id.parts[i].designation, id.parts[i].equation);
  return text + (id.pairs.empty() ? "." : ". Mixing of the pairs: " + pair_kinds(id) + ".");
}

/// A new blend bears its composition as its name; it need not stand there twice.
std::string made_of(const Identification& id) {
  const auto words = composition_words(id);
  return !id.designated && words.starts_with(id.name) ? "New blend, composition as named, without tolerances" : words;
}

std::string printed_step(const PtChart& chart, const Layout& layout) {
  const auto& o = chart.options;
  const auto unit = o.by == ChartOptions::By::temperature ? difference_label(o.temperature_unit) : std::string(units::unit(o.pressure_units.front()).label);
  const double step = o.step.value_or(1);
  if (layout.every == 1) return fmt::format("Printed in steps of {} {}.", argument_figure(step), unit);
  return fmt::format("Printed in steps of {} {}: every {}{} row of the chart in steps of {} {}.", argument_figure(step * layout.every), unit, layout.every,
                     layout.every == 2 ? "nd" : "th", argument_figure(step), unit);
}

/// "AR4" for "IPCC AR4", "EU" for the regulation: the boxes are narrow, gwp_note() has the names in full.
std::string short_report(const std::string& report) {
  if (report.starts_with("IPCC ")) return report.substr(5);
  return report.find("(EU)") != std::string::npos ? "EU" : report;
}

bool counts_below_one(const GwpWords& g) { return g.note.starts_with("the sum"); }

std::string gwp_note(const Identification& id) {
  std::string reports, marked;
  for (const auto& g : gwp_words(id)) {
    reports += (reports.empty() ? "" : ", ") + (short_report(g.report) == "EU" ? g.report + " (EU)" : g.report);
    if (counts_below_one(g)) marked = " * " + g.note + ".";
  }
  return fmt::format("GWP over 100 years: {}. ODP: Montreal Protocol.{}", reports, marked);
}

/// Names the estimated pairs, or counts them where a blend has so many that the sheet has no room; empty where there is none.
std::string estimated_box(const Identification& id) {
  constexpr std::ptrdiff_t most_named = 9;
  const auto n = std::count_if(id.pairs.begin(), id.pairs.end(), [](const PairNote& p) { return is_estimated(p.kind); });
  if (n == 0) return "";
  const auto which = n <= most_named ? estimated_words(id, false) : fmt::format("{} of the {} pairs (the text form names them)", n, id.pairs.size());
  return "ESTIMATED: " + which + ". No measurement of the pair stands behind these figures; treat pressures and glide as approximate.";
}

/// Everything below the rows but the cautions. The layout is not known yet when their height is estimated: `layout` may be null.
Notes notes(const PtChart& chart, const Layout* layout) {
  const auto& id = chart.identity;
  const auto rows = layout ? layout->rows : trimmed(all_rows(chart));
  const auto units = layout ? layout->units : chart.options.pressure_units.size();
  Notes n;
  if (boiling_row(chart, rows)) n.lines.emplace_back("\u25b6 ruled row in heavy type: nearest to boiling at the assumed air pressure.");
  for (auto& legend : legends(chart, rows, units)) n.lines.push_back(std::move(legend));
  if (const auto words = one_column_words(chart); !words.empty()) n.lines.push_back(words);
  for (const auto& words : use_words(chart)) n.lines.push_back(words);
  n.lines.push_back(range_words(chart) + ".");
  n.lines.push_back(top_words(chart) + ".");
  n.lines.push_back(sources(id));
  n.lines.push_back(gwp_note(id));
  if (const auto words = uncertain_words(id, true); !words.empty()) n.lines.push_back("Not certain, check the standard: " + words + ".");
  n.lines.emplace_back(nominal_words);
  n.lines.push_back(layout ? printed_step(chart, *layout) : std::string(90, 'x'));
  if (layout && units < chart.options.pressure_units.size())
    n.lines.push_back(
        fmt::format("This sheet has room for {} of the {} pressure units asked for; the text form shows all.", units, chart.options.pressure_units.size()));
  n.estimated = estimated_box(id);
  return n;
}

struct CautionText {
  std::vector<std::string> specific;                         ///< one item each
  std::vector<std::pair<std::string, std::string>> general;  ///< topic, its sentences run together
};

CautionText caution_text(const PtChart& chart) {
  CautionText out;
  for (const auto& c : chart.cautions) {
    const auto text = with_degree_sign(c.short_text);
    if (c.when != "always") {
      out.specific.push_back(text);
      continue;
    }
    const auto topic = topic_words(c.topic);
    const auto it = std::find_if(out.general.begin(), out.general.end(), [&](const auto& g) { return g.first == topic; });
    if (it == out.general.end())
      out.general.emplace_back(topic, text);
    else
      it->second += " " + text;
  }
  return out;
}

// --- height of what stands around the rows, mm; follows the style sheet below ---

double name_points(const std::string& name) { return std::clamp(46 * (left_width - 4) / (text_width(name, 46) * bold + 0.1), 15.0, 46.0); }

/// Running text in two balanced columns.
double shared_height(const std::vector<int>& paragraphs, double between, double width_of_line) {
  double sum = 0;
  for (const int lines : paragraphs) sum += lines * width_of_line + between;
  return paragraphs.empty() ? 0 : (sum + width_of_line) / 2;
}

double header_height(const PtChart& chart) {
  const auto& id = chart.identity;
  const double points = name_points(id.name);
  const double left =
      line_count(id.name, points, left_width, bold) * points * mm_per_point + 1 + line_count(made_of(id), 11, left_width, bold) * line_height(11);
  return std::max(left, 13 + 1 + line_height(small_print) + line_height(12)) + 2.7;
}

double notes_height(const PtChart& chart) {
  const auto n = notes(chart, nullptr);
  std::vector<int> paragraphs;
  for (const auto& line : n.lines) paragraphs.push_back(line_count(line, small_print, column_width));
  const double box = n.estimated.empty() ? 0 : 4.3 + line_count(n.estimated, 9, sheet_width - 4.4, bold) * line_height(9);
  return 1.5 + box + shared_height(paragraphs, 0.3, line_height(small_print));
}

double cautions_height(const PtChart& chart) {
  const auto text = caution_text(chart);
  std::vector<int> specific, general;
  for (const auto& s : text.specific) specific.push_back(line_count(s, small_print, column_width - 4.5, bold));
  for (const auto& [topic, s] : text.general) general.push_back(line_count(fmt::format("{}: {}", topic, s), small_print, column_width));
  const double box = specific.empty() ? 0 : 2.9 + shared_height(specific, 0.3, line_height(small_print));
  return 3 + 4.6 + box + shared_height(general, 0.3, line_height(small_print));
}

double around_height(const PtChart& chart) {
  const double line_above = 2 + line_height(10);
  return header_height(chart) + line_above + notes_height(chart) + cautions_height(chart);
}

// --- HTML ---

constexpr std::string_view style = R"css(
@page { margin: 10mm }
* { box-sizing: border-box }
html { background: #fff; color: #000 }
body { margin: 0 auto; width: 190mm; font: 8pt/1.2 Arial, Helvetica, "Liberation Sans", Arimo, "Nimbus Sans", sans-serif;
  -webkit-print-color-adjust: exact; print-color-adjust: exact }
@media screen { body { margin: 10mm auto } }
main { display: flex; flex-direction: column; height: 257mm }
header { display: flex; gap: 4mm; border-bottom: 1.2mm solid #000; padding-bottom: 1.5mm }
header > div:first-child { flex: 1; min-width: 0 }
h1 { margin: 0; font-weight: 800; line-height: .98; letter-spacing: -.01em; overflow-wrap: anywhere }
.made-of { font-size: 11pt; font-weight: 600; margin: 1mm 0 0 }
.boxes { width: 68mm; flex: none }
.safety { border: .7mm solid #000; padding: .8mm 1.5mm; display: flex; gap: 2mm; align-items: center; min-height: 13mm }
.safety b { font-size: 26pt; line-height: 1 }
.safety span { font-size: 9pt; font-weight: 600 }
.gwp { width: 100%; border-collapse: collapse; margin-top: 1mm; table-layout: fixed }
.gwp td, .gwp th { padding: 0; text-align: center; font-weight: 400; white-space: nowrap }
.gwp td { font-weight: 700; font-size: 12pt; line-height: 1.2; font-variant-numeric: tabular-nums }
.gwp td.absent { font-size: 8pt }
.shown { display: flex; justify-content: space-between; font-size: 10pt; font-weight: 700; margin: 1mm 0 }
.shown span { font-weight: 400 }
.chart { flex: 1 1 0; min-height: 0; display: grid; column-gap: 5mm; justify-content: space-around; grid-template-rows: minmax(0, 1fr) }
.chart table { height: 100%; width: 100%; border-collapse: collapse; font-variant-numeric: tabular-nums }
.chart th { font-size: 8pt; line-height: 1.15; font-weight: 700; text-align: right; vertical-align: bottom; padding: 0 .5mm .4mm; height: 1px }
.chart thead tr { border-bottom: .5mm solid #000 }
.chart th i { font-style: normal; font-weight: 400; display: block }
.chart td, .chart tbody th { font-size: var(--figures); line-height: 1; padding: 0 .4em 0 0; text-align: right; vertical-align: middle;
  white-space: nowrap; height: auto }
.chart tbody th { font-weight: 800; border-right: .3mm solid #000; padding-right: .35em }
.chart tbody tr { border-bottom: .15mm solid #777 }
.chart tbody tr.fifth { border-bottom: .35mm solid #000 }
.chart tbody tr.none { border-bottom: 0 }
.chart td.vacuum, .chart th.vacuum { font-style: italic }
.chart td.bracket, .chart tbody th.bracket { padding-right: .1em }
.chart tr.boiling td, .chart tr.boiling th { font-weight: 800; border-top: .7mm solid #000; border-bottom: .7mm solid #000 }
.chart td.glide { font-size: calc(var(--figures) * .85); padding-right: .2em }
.chart td.parted { border-left: .15mm solid #000 }
.chart .pointer { font-size: .6em; float: left; line-height: 1.7 }
.whole { white-space: nowrap }
.estimated { border: .7mm solid #000; font-size: 9pt; font-weight: 700; padding: .7mm 1.5mm; margin: 1.5mm 0 0 }
.notes, .two { columns: 2; column-gap: 5mm }
.notes { margin: 1.5mm 0 0 }
.notes p, .two p { margin: 0 0 .3mm }
.cautions { border-top: .7mm solid #000; margin-top: 1.5mm; padding-top: .8mm }
h2 { font-size: 10pt; margin: 0 0 .5mm; line-height: 1.15 }
.specific { border: .35mm solid #000; padding: .6mm 1.2mm; margin: 0 0 1mm; columns: 2; column-gap: 5mm; list-style: none; font-weight: 600 }
.specific li { break-inside: avoid; padding-left: 3mm; text-indent: -3mm; margin: 0 0 .3mm }
.specific li::before { content: "\25A0\00A0" }
)css";

std::string safety_html(const Identification& id) {
  if (!id.designated || id.safety_group.empty())
    return fmt::format("<div class=\"safety\"><b>?</b><span>Safety group: {}</span></div>", escaped(safety_words(id)));
  const auto meaning = group_meaning(id.safety_group);
  return fmt::format("<div class=\"safety\"><b>{}</b><span>{}<br>ISO 817 / ASHRAE 34</span></div>", escaped(id.safety_group),
                     escaped(meaning.empty() ? "safety group" : meaning));
}

std::string gwp_html(const Identification& id) {
  std::string heads, figures;
  const auto add = [&](const std::string& head, const std::string& figure, const char* mark) {
    heads += fmt::format("<th scope=\"col\">{}</th>", escaped(head));
    figures += fmt::format("<td{}>{}{}</td>", figure.size() > 6 ? " class=\"absent\"" : "", escaped(figure), mark);
  };
  for (const auto& g : gwp_words(id)) add("GWP " + short_report(g.report), g.figure, counts_below_one(g) ? "*" : "");
  add("ODP", odp_words(id), "");
  return fmt::format("<table class=\"gwp\"><tr>{}</tr><tr>{}</tr></table>", heads, figures);
}

std::string header_html(const PtChart& chart) {
  const auto& id = chart.identity;
  return fmt::format("<header><div><h1 style=\"font-size:{:.1f}pt\">{}</h1><p class=\"made-of\">{}</p></div><div class=\"boxes\">{}{}</div></header>\n",
                     name_points(id.name), escaped(id.name), running(made_of(id)), safety_html(id), gwp_html(id));
}

/// With several pressure units a line stands between the liquid's columns and the vapour's.
bool starts_dew(const std::vector<Column>& shown, std::size_t i) {
  return i > 1 && shown[i].kind == Column::Kind::pressure && shown[i].title != shown[i - 1].title &&
         shown[i].title == shown[std::min(i + 1, shown.size() - 1)].title;
}

std::string cell_html(const std::vector<Column>& shown, std::size_t i, const ChartRow& row, const ChartRow* boiling) {
  const auto& column = shown[i];
  const auto cell = column.cell(row);
  std::string classes = column.kind == Column::Kind::glide ? "glide" : starts_dew(shown, i) ? "parted" : "";
  if (cell.vacuum) classes += cell.figure.starts_with('(') ? " vacuum bracket" : " vacuum";
  const auto attribute = classes.empty() ? "" : fmt::format(" class=\"{}\"", classes.substr(classes.find_first_not_of(' ')));
  if (column.kind != Column::Kind::argument) return fmt::format("<td{}>{}</td>", attribute, figure_html(cell));
  const auto pointer = &row == boiling ? "<span class=\"pointer\">&#9654;</span>" : "";
  return fmt::format("<th scope=\"row\"{}>{}{}{}</th>", attribute, pointer, row.extrapolated ? "! " : "", figure_html(cell));
}

std::string block_html(const PtChart& chart, const Layout& layout, const std::vector<Column>& shown, std::size_t block, const ChartRow* boiling) {
  std::string out = "<table><thead><tr>";
  for (const auto& c : shown) {
    out +=
        fmt::format("<th scope=\"col\">{}{}<i>{}</i></th>", escaped(head_title(c, chart)), c.phase.empty() ? "" : "<br>" + escaped(c.phase), escaped(c.unit));
  }
  out += "</tr></thead><tbody>\n";
  for (std::size_t i = 0; i < layout.rows_per_block; ++i) {
    const auto index = block * layout.rows_per_block + i;
    if (index >= layout.rows.size()) {
      // keeps the rows of a shorter last block as high as those of the others
      out += fmt::format("<tr class=\"none\"><td colspan=\"{}\">&nbsp;</td></tr>\n", shown.size());
      continue;
    }
    const auto& row = *layout.rows[index];
    out += &row == boiling ? "<tr class=\"boiling\">" : i % 5 == 4 ? "<tr class=\"fifth\">" : "<tr>";
    for (std::size_t c = 0; c < shown.size(); ++c) out += cell_html(shown, c, row, boiling);
    out += "</tr>\n";
  }
  return out + "</tbody></table>\n";
}

std::string chart_html(const PtChart& chart, const Layout& layout) {
  const auto shown = columns(chart, layout.rows, layout.units);
  const auto* boiling = boiling_row(chart, layout.rows);
  const double highest = head_height() + static_cast<double>(layout.rows_per_block) * layout.points * mm_per_point * 1.7;
  auto out = fmt::format("<p class=\"shown\">{}<span>{}</span></p>\n", escaped(what_is_shown(chart)), escaped(ambient_words(chart.options)));
  out += fmt::format("<section class=\"chart\" style=\"--figures:{:.1f}pt;grid-template-columns:repeat({},{:.1f}mm);max-height:{:.0f}mm\">\n", layout.points,
                     layout.blocks, layout.width, highest);
  for (std::size_t b = 0; b < layout.blocks; ++b) out += block_html(chart, layout, shown, b, boiling);
  return out + "</section>\n";
}

std::string notes_html(const Notes& n) {
  std::string out;
  if (!n.estimated.empty()) out += "<p class=\"estimated\">" + running(n.estimated) + "</p>\n";
  out += "<section class=\"notes\">";
  for (const auto& line : n.lines) out += "<p>" + running(line) + "</p>\n";
  return out + "</section>\n";
}

std::string cautions_html(const PtChart& chart) {
  const auto text = caution_text(chart);
  if (text.specific.empty() && text.general.empty()) return "";
  std::string out = "<section class=\"cautions\"><h2>Cautions</h2>\n";
  if (!text.specific.empty()) {
    out += "<ul class=\"specific\">\n";
    for (const auto& s : text.specific) out += "<li>" + running(s) + "</li>\n";
    out += "</ul>\n";
  }
  out += "<div class=\"two\">";
  for (const auto& [topic, s] : text.general) out += fmt::format("<p><b>{}:</b> {}</p>\n", escaped(topic), running(s));
  return out + "</div></section>\n";
}

}  // namespace

std::string render_card(const PtChart& chart) {
  const auto layout = lay_out(chart, sheet_height - around_height(chart));
  std::string out = "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta name=\"viewport\" content=\"width=device-width\">\n";
  out += fmt::format("<title>{}: {}</title>\n<style>{}</style>\n</head>\n<body>\n<main>\n", escaped(chart.identity.name), escaped(what_is_shown(chart)), style);
  out += header_html(chart) + chart_html(chart, layout) + notes_html(notes(chart, &layout)) + cautions_html(chart);
  return out + "</main>\n</body>\n</html>\n";
}

}  // namespace zeotrope::apply
