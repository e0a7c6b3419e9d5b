#pragma once

#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "zeotrope/apply/pt_chart.hpp"

/// What the renderers of a chart share: its columns as printed, and the wording of head and foot. Not installed.
namespace zeotrope::apply::parts {

using Rows = std::vector<const ChartRow*>;

struct Cell {
  std::string figure;   ///< "-" where there is no value
  bool vacuum = false;  ///< below ambient: bracketed inches of mercury, or a negative gauge figure
};

struct Column {
  enum class Kind { argument, pressure, temperature, glide } kind;
  std::string title;  ///< "bubble", "dew", "saturation", "glide"; the quantity in the column of arguments
  std::string phase;  ///< "(liquid)", "(vapour)" or empty
  std::string unit;
  std::function<Cell(const ChartRow&)> cell;
};

/// Columns in print order. `units`: how many of the chart's pressure units to show.
std::vector<Column> columns(const PtChart& chart, const Rows& rows, std::size_t units);
Rows all_rows(const PtChart& chart);
/// The row that is nearest to boiling at ambient pressure; nothing where the rows do not pass it.
const ChartRow* boiling_row(const PtChart& chart, const Rows& rows);
bool has_figures(const ChartRow& row);

bool is_blend(const Identification& id);
/// "K" or "\u00b0F": differences carry no zero point, so Celsius and kelvin share one.
std::string difference_label(units::Temperature unit);

std::string composition_words(const Identification& id);
std::string safety_words(const Identification& id);
/// "lower toxicity, no flame propagation" for "A1"; empty for what is not a single group.
std::string group_meaning(const std::string& group);
struct GwpWords {
  std::string report, figure, note;
};
std::vector<GwpWords> gwp_words(const Identification& id);
std::string odp_words(const Identification& id);

std::string what_is_shown(const PtChart& chart);
/// Why there is one column; empty for two columns, a pure fluid says so.
std::string one_column_words(const PtChart& chart);
std::vector<std::string> use_words(const PtChart& chart);
std::string ambient_words(const ChartOptions& options);
std::string range_words(const PtChart& chart);
std::string top_words(const PtChart& chart);
/// Explains each mark that occurs in `rows`: brackets, minus signs, '!', dashes with their reasons.
std::vector<std::string> legends(const PtChart& chart, const Rows& rows, std::size_t units);
/// "R-32 / R-1234yf (estimated by rule), ..."; empty where no pair is estimated.
std::string estimated_words(const Identification& id, bool with_reasons);
/// "composition of R-4xx; GWP (AR6) of R-zz"; `printed_only`: only what a card shows.
std::string uncertain_words(const Identification& id, bool printed_only);
inline constexpr std::string_view nominal_words = "Figures are for the pure or nominal refrigerant, without oil and air.";

/// Caution text for print: "degC" with the degree sign.
std::string with_degree_sign(std::string text);
std::string topic_words(const std::string& topic);
/// Number of characters, not bytes, of UTF-8 text.
std::size_t length(std::string_view utf8);
/// One line: line breaks and tabs become blanks.
std::string one_line(std::string text);

}  // namespace zeotrope::apply::parts
