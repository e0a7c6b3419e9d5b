#include <fmt/format.h>

#include <algorithm>
#include <sstream>

#include "render_parts.hpp"
#include "zeotrope/apply/pt_chart.hpp"

namespace zeotrope::apply {

namespace {

using namespace parts;

constexpr std::size_t page_width = 100;

/// Paragraph of words no wider than the page; `lead` begins the first line, the others are indented to its width.
std::string paragraph(const std::string& lead, const std::string& text) {
  const std::size_t indent = length(lead);
  std::string out, line = lead;
  std::size_t used = indent;
  bool first_word = true;
  std::istringstream words(text);
  for (std::string word; words >> word; first_word = false) {
    if (!first_word && used + 1 + length(word) > page_width) {
      out += line + "\n";
      line.assign(indent, ' ');
      used = indent;
      first_word = true;
    }
    if (!first_word) line += ' ';
    line += word;
    used += length(word) + (first_word ? 0 : 1);
  }
  return out + line + "\n";
}

std::string labelled(std::string_view label, const std::string& text) { return paragraph(fmt::format("{:<14}", label), text); }

std::string padded(const std::string& text, std::size_t width, bool right) {
  const std::string blanks(width - std::min(width, length(text)), ' ');
  return right ? blanks + text : text + blanks;
}

std::string head(const PtChart& chart) {
  const auto& id = chart.identity;
  std::string out = fmt::format("{}\n{}\n", id.name, std::string(length(id.name), '='));
  out += labelled("Composition", composition_words(id));
  out += labelled("Safety group", safety_words(id) + (id.designated && !group_meaning(id.safety_group).empty() ? ": " + group_meaning(id.safety_group) : ""));
  std::string_view label = "GWP 100 years";
  for (const auto& g : gwp_words(id)) {
    out += paragraph(fmt::format("{:<14}{:>9}  ", label, g.figure), g.report + (g.note.empty() ? "" : "; " + g.note));
    label = "";
  }
  out += paragraph(fmt::format("{:<14}{:>9}  ", "ODP", odp_words(id)), "Montreal Protocol");
  return out;
}

struct Table {
  std::vector<Column> columns;
  std::vector<std::vector<std::string>> lines;  ///< three of head, then the rows
  std::vector<std::size_t> widths;
};

/// A figure without bracket gets a blank in place of the closing one, so that digits stay under digits.
std::string figure(const Cell& cell, bool beside_brackets) { return beside_brackets && !cell.figure.ends_with(')') ? cell.figure + " " : cell.figure; }

bool has_brackets(const Column& column, const Rows& rows) {
  return std::any_of(rows.begin(), rows.end(), [&](const ChartRow* r) { return column.cell(*r).figure.ends_with(')'); });
}

Table make_table(const PtChart& chart, const Rows& rows) {
  Table t;
  t.columns = columns(chart, rows, chart.options.pressure_units.size());
  t.lines.assign(rows.size() + 3, {});
  for (const auto& c : t.columns) {
    const bool brackets = has_brackets(c, rows);
    const std::string gap = brackets ? " " : "";
    t.lines[0].push_back(c.title + gap);
    t.lines[1].push_back(c.phase + gap);
    t.lines[2].push_back(c.unit + gap);
    for (std::size_t i = 0; i < rows.size(); ++i) t.lines[i + 3].push_back(figure(c.cell(*rows[i]), brackets));
    std::size_t width = 0;
    for (const auto& line : t.lines) width = std::max(width, length(line.back()));
    t.widths.push_back(width);
  }
  return t;
}

std::string row_marks(const ChartRow& row, const ChartRow* boiling) {
  std::string marks;
  if (row.extrapolated) marks += " !";
  if (&row == boiling) marks += " *";
  return marks;
}

std::string table(const PtChart& chart, const Rows& rows, const ChartRow* boiling) {
  const auto t = make_table(chart, rows);
  std::string out;
  for (std::size_t i = 0; i < t.lines.size(); ++i) {
    std::string line = " ";
    for (std::size_t c = 0; c < t.columns.size(); ++c) line.append(" ").append(padded(t.lines[i][c], t.widths[c] + 1, true));
    if (i >= 3) line += row_marks(*rows[i - 3], boiling);
    line.erase(line.find_last_not_of(' ') + 1);
    if (i != 1 || !line.empty()) out += line + "\n";
    if (i == 2) {
      std::size_t wide = 1;
      for (const auto w : t.widths) wide += w + 2;
      out += "  " + std::string(wide - 2, '-') + "\n";
    }
  }
  return out;
}

/// Where a pair comes from, as far as it does not stand in the line of the estimated ones.
std::string origin(const PairNote& p) {
  switch (p.kind) {
    case data::PairKind::published:
      return p.source;
    case data::PairKind::fitted:
      return p.provenance.substr(0, p.provenance.find(';'));
    case data::PairKind::fitted_weak:
      return p.provenance;
    default:
      return "";
  }
}

std::string pair_table(const Identification& id) {
  std::string out = "\nPairs of the mixture model\n";
  std::size_t wide = 0;
  for (const auto& p : id.pairs) wide = std::max(wide, length(p.first) + length(p.second) + 3);
  for (const auto& p : id.pairs) {
    auto value = fmt::format("gamma_T {:.5g}", p.gamma_T);
    if (p.gamma_T_uncertainty) value += fmt::format(", uncertain by {:.2g}", *p.gamma_T_uncertainty);
    out += paragraph("  " + padded(p.first + " / " + p.second, wide + 2, false) + padded(std::string(in_words(p.kind)), 28, false),
                     value + (origin(p).empty() ? "" : "; " + origin(p)));
  }
  const auto estimated = estimated_words(id, true);
  if (!estimated.empty())
    out += paragraph("estimated: ", estimated + ". No measurement of the pair stands behind these figures; treat pressures and glide as approximate.");
  return out;
}

std::string foot(const PtChart& chart, const Rows& rows, const ChartRow* boiling) {
  const auto& id = chart.identity;
  std::string out;
  if (boiling) out += paragraph("  ", "\"*\" row nearest to boiling at the assumed air pressure.");
  for (const auto& legend : legends(chart, rows, chart.options.pressure_units.size())) out += paragraph("  ", legend);
  out += out.empty() ? "How to read it\n" : "\nHow to read it\n";
  if (const auto words = one_column_words(chart); !words.empty()) out += paragraph("  ", words);
  for (const auto& words : use_words(chart)) out += paragraph("  ", words);
  out += paragraph("  ", ambient_words(chart.options));
  out += paragraph("  ", std::string(nominal_words));
  out += "\nRange\n" + paragraph("  ", range_words(chart) + ".") + paragraph("  ", top_words(chart) + ".");
  out += "\nEquations\n";
  for (const auto& p : id.parts) out += paragraph(fmt::format("  {}: ", p.designation), p.equation + (p.source.empty() ? "" : "; " + p.source) + ".");
  if (!id.pairs.empty()) out += pair_table(id);
  if (const auto words = uncertain_words(id, false); !words.empty()) out += "\nNot certain, check the standard\n" + paragraph("  ", words + ".");
  return out;
}

std::string caution_list(const PtChart& chart) {
  if (chart.cautions.empty()) return "";
  std::string out = "\nCautions\n", topic;
  for (const auto& c : chart.cautions) {
    if (c.topic != topic) out += fmt::format("  {}\n", topic_words(c.topic));
    topic = c.topic;
    out += paragraph("    - ", with_degree_sign(c.short_text));
  }
  return out;
}

}  // namespace

std::string render_text(const PtChart& chart) {
  const auto rows = all_rows(chart);
  const auto* boiling = boiling_row(chart, rows);
  return head(chart) + "\n" + what_is_shown(chart) + "\n\n" + table(chart, rows, boiling) + "\n" + foot(chart, rows, boiling) + caution_list(chart);
}

}  // namespace zeotrope::apply
