#include "layout.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "zeotrope/apply/figures.hpp"

namespace zeotrope::command {

std::size_t width(std::string_view text) {
  return static_cast<std::size_t>(std::count_if(text.begin(), text.end(), [](char c) { return (static_cast<unsigned char>(c) & 0xc0) != 0x80; }));
}

std::string wrapped(std::string_view lead, std::string_view text, std::size_t columns) {
  const std::string indent(width(lead), ' ');
  std::string out, line(lead);
  bool fresh = true;
  for (std::size_t at = 0; at < text.size();) {
    const auto end = std::min(text.find_first_of(" \n", at), text.size());
    const auto word = text.substr(at, end - at);
    at = end + 1;
    if (word.empty()) continue;
    if (!fresh && width(line) + 1 + width(word) > columns) {
      out += line + "\n";
      line = indent;
      fresh = true;
    }
    if (!fresh) line += ' ';
    line += word;
    fresh = false;
  }
  return out + line + "\n";
}

std::string Table::text(std::string_view indent) const {
  std::vector<std::size_t> widths(alignment_.size(), 0);
  for (const auto& cells : rows_)
    for (std::size_t i = 0; i < cells.size(); ++i) widths[i] = std::max(widths[i], width(cells[i]));
  std::string out;
  for (const auto& cells : rows_) {
    std::string line(indent);
    for (std::size_t i = 0; i < cells.size(); ++i) {
      const std::string pad(widths[i] - width(cells[i]), ' ');
      line += (i == 0 ? "" : "  ") + (alignment_[i] == 'r' ? pad + cells[i] : cells[i] + pad);
    }
    line.erase(line.find_last_not_of(' ') + 1);
    out += line + "\n";
  }
  return out;
}

std::string pressure_text(double pascal, units::Pressure unit, double ambient) {
  // the chart's brackets need its legend; a single figure says it in words
  const bool vacuum = apply::is_vacuum_figure(pascal, unit, ambient);
  const auto shown = vacuum ? units::Pressure::inhg_vacuum : unit;
  return fmt::format("{} {}", apply::pressure_figure(pascal, shown, ambient), units::unit(shown).label);
}

std::string temperature_text(double kelvin, units::Temperature unit, int decimals) {
  return fmt::format("{} {}", apply::temperature_figure(kelvin, unit, decimals), units::label(unit));
}

std::string_view difference_label(units::Temperature unit) { return units::label(unit == units::Temperature::fahrenheit ? unit : units::Temperature::kelvin); }

std::string difference_text(double kelvin, units::Temperature unit, int decimals) {
  return fmt::format("{} {}", apply::difference_figure(kelvin, unit, decimals), difference_label(unit));
}

namespace {

bool digit(char c) { return c >= '0' && c <= '9'; }

unsigned long long take_number(const std::string& s, std::size_t& at) {
  unsigned long long v = 0;
  while (at < s.size() && digit(s[at])) v = v * 10 + static_cast<unsigned long long>(s[at++] - '0');
  return v;
}

}  // namespace

bool natural_less(const std::string& a, const std::string& b) {
  std::size_t i = 0, j = 0;
  while (i < a.size() && j < b.size()) {
    if (digit(a[i]) && digit(b[j])) {
      const auto x = take_number(a, i), y = take_number(b, j);
      if (x != y) return x < y;
    } else {
      if (a[i] != b[j]) return a[i] < b[j];
      ++i;
      ++j;
    }
  }
  return a.size() - i < b.size() - j;
}

namespace {

/// Length of the UTF-8 sequence at the start of `text`; 0 where there is none.
std::size_t sequence(std::string_view text) {
  const auto lead = static_cast<unsigned char>(text.front());
  const std::size_t length = lead < 0x80 ? 1 : lead >= 0xc2 && lead < 0xe0 ? 2 : lead >= 0xe0 && lead < 0xf0 ? 3 : lead >= 0xf0 && lead < 0xf5 ? 4 : 0;
  if (length == 0 || length > text.size()) return 0;
  for (std::size_t i = 1; i < length; ++i)
    if ((static_cast<unsigned char>(text[i]) & 0xc0) != 0x80) return 0;
  // U+0080 to U+009F are control characters too
  if (length == 2 && lead == 0xc2 && static_cast<unsigned char>(text[1]) < 0xa0) return 0;
  return length;
}

}  // namespace

std::string printable(std::string_view text) {
  std::string r;
  while (!text.empty()) {
    const auto n = sequence(text);
    const auto c = static_cast<unsigned char>(text.front());
    if (n == 0 || (c < 0x20 && c != '\n') || c == 0x7f)
      r += '?';
    else
      r += text.substr(0, n);
    text.remove_prefix(std::max<std::size_t>(n, 1));
  }
  return r;
}

}  // namespace zeotrope::command
