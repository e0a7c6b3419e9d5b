#include "zeotrope/data/names.hpp"

#include <algorithm>
#include <numeric>

namespace zeotrope::data {

namespace {
constexpr bool digit(char c) { return c >= '0' && c <= '9'; }
}  // namespace

std::string name_key(std::string_view name) {
  std::string key;
  for (const char c : name) {
    if (c >= 'A' && c <= 'Z')
      key += static_cast<char>(c - 'A' + 'a');
    else if ((c >= 'a' && c <= 'z') || digit(c))
      key += c;
  }
  const bool numbered = key.size() > 1 && key[0] == 'r' && (digit(key[1]) || (key.size() > 2 && (key[1] == 'c' || key[1] == 'e') && digit(key[2])));
  return numbered ? key.substr(1) : key;
}

namespace {

/// Levenshtein distance.
std::size_t distance(const std::string& a, const std::string& b) {
  std::vector<std::size_t> row(b.size() + 1);
  std::iota(row.begin(), row.end(), std::size_t{0});
  for (std::size_t i = 1; i <= a.size(); ++i) {
    std::size_t corner = row[0];
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t above = row[j];
      row[j] = std::min({above + 1, row[j - 1] + 1, corner + (a[i - 1] == b[j - 1] ? 0 : 1)});
      corner = above;
    }
  }
  return row.back();
}

}  // namespace

std::vector<std::string> nearest_names(std::string_view wanted, const std::vector<std::string>& known, std::size_t count) {
  const auto key = name_key(wanted.substr(0, 64));
  std::vector<std::pair<std::size_t, std::string>> ranked;
  for (const auto& name : known) {
    const auto d = distance(key, name_key(name));
    if (d <= std::max<std::size_t>(1, key.size() / 2)) ranked.emplace_back(d, name);
  }
  std::stable_sort(ranked.begin(), ranked.end(), [](const auto& a, const auto& b) { return a.first < b.first; });
  std::vector<std::string> r;
  for (std::size_t i = 0; i < std::min(count, ranked.size()); ++i) r.push_back(ranked[i].second);
  return r;
}

}  // namespace zeotrope::data
