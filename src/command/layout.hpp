#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "zeotrope/units.hpp"

/// Plain text for a terminal or a file: UTF-8, no colour codes.
namespace zeotrope::command {

/// Columns that a text takes; characters, not bytes.
std::size_t width(std::string_view text);

/// Lines of at most `columns`; the first starts with `lead`, the others with as many blanks.
std::string wrapped(std::string_view lead, std::string_view text, std::size_t columns = 110);

/// Rows of cells in aligned columns.
class Table {
 public:
  /// Per column 'l' or 'r'.
  explicit Table(std::string alignment) : alignment_(std::move(alignment)) {}
  void row(std::vector<std::string> cells) { rows_.push_back(std::move(cells)); }
  bool empty() const { return rows_.empty(); }
  std::string text(std::string_view indent = "") const;

 private:
  std::string alignment_;
  std::vector<std::vector<std::string>> rows_;
};

/// A pressure with its unit; psig below the ambient pressure as inches of mercury vacuum.
std::string pressure_text(double pascal, units::Pressure unit, double ambient);
std::string temperature_text(double kelvin, units::Temperature unit, int decimals = 1);
/// Of a difference: K, or °F without the offset.
std::string difference_text(double kelvin, units::Temperature unit, int decimals = 1);
std::string_view difference_label(units::Temperature unit);

/// Order of designations, R-12 before R-123 before R-1234yf: runs of digits count as numbers.
bool natural_less(const std::string& a, const std::string& b);

/// Text that may go to a terminal: control characters and bytes that are no UTF-8 become '?'.
std::string printable(std::string_view text);

}  // namespace zeotrope::command
