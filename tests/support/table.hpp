#pragma once

#include <cmath>
#include <fstream>
#include <map>
#include <optional>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

namespace support {

/// One row of a published table, by column name.
class Row {
 public:
  Row(const std::vector<std::string>& names, const std::string& line) {
    std::istringstream in(line);
    std::string cell;
    for (const auto& name : names) {
      if (!std::getline(in, cell, ',')) cell.clear();
      cells_[name] = cell;
    }
  }
  const std::string& text(const std::string& column) const {
    const auto it = cells_.find(column);
    if (it == cells_.end()) throw std::out_of_range("no column " + column);
    return it->second;
  }
  std::optional<double> number(const std::string& column) const {
    const auto& t = text(column);
    if (t.empty()) return std::nullopt;
    return std::stod(t);
  }
  /// Half a unit of the last printed digit; trailing zeros of a whole number count as printed.
  double half_step(const std::string& column) const {
    std::string t = text(column);
    const auto e = t.find_first_of("eE");
    double scale = 1;
    if (e != std::string::npos) {
      scale = std::pow(10.0, std::stod(t.substr(e + 1)));
      t.resize(e);
    }
    const auto point = t.find('.');
    double step = 0.5;
    if (point != std::string::npos)
      for (std::size_t i = point + 1; i < t.size(); ++i) step /= 10;
    return step * scale;
  }
  std::vector<double> numbers(const std::string& column) const {
    std::vector<double> r;
    for (const auto& t : texts(column)) r.push_back(std::stod(t));
    return r;
  }
  std::vector<std::string> texts(const std::string& column) const {
    std::vector<std::string> r;
    std::istringstream in(text(column));
    for (std::string t; std::getline(in, t, '|');) r.push_back(t);
    return r;
  }

 private:
  std::map<std::string, std::string> cells_;
};

/// A CSV file of tests/published: '#' comments, one header line, rows without quoting.
inline std::vector<Row> published(const std::string& name) {
  std::ifstream in(std::string(ZEOTROPE_TESTS_FOLDER) + "/" + name);
  if (!in) throw std::runtime_error("cannot open " + name);
  std::vector<std::string> columns;
  std::vector<Row> rows;
  for (std::string line; std::getline(in, line);) {
    if (!line.empty() && line.back() == '\r') line.pop_back();
    if (line.empty() || line.front() == '#') continue;
    if (columns.empty()) {
      std::istringstream head(line);
      for (std::string c; std::getline(head, c, ',');) columns.push_back(c);
      continue;
    }
    rows.emplace_back(columns, line);
  }
  if (rows.empty()) throw std::runtime_error(name + " has no rows");
  return rows;
}

}  // namespace support
