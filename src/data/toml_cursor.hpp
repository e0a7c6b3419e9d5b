#pragma once

#include <fmt/format.h>

#include <array>
#include <cmath>
#include <initializer_list>
#include <limits>
#include <optional>
#include <set>
#include <string>
#include <string_view>
#include <vector>

// toml++ 3.3 asserts where it should report on some malformed keys ("[[[["); without assertions it reports.
#define TOML_ASSERT(expr) static_cast<void>(0)
#include <toml++/toml.h>

#include "zeotrope/data/records.hpp"
#include "zeotrope/error.hpp"

namespace zeotrope::data {

/// Bounds a number must keep; the text is what the message says would be right.
struct Bounds {
  double low = -std::numeric_limits<double>::infinity();
  double high = std::numeric_limits<double>::infinity();
  bool open_low = false;
  std::string_view right = "a finite number";
};
inline constexpr Bounds any{};
inline constexpr Bounds positive{0, std::numeric_limits<double>::infinity(), true, "a number above 0"};
inline constexpr Bounds not_negative{0, std::numeric_limits<double>::infinity(), false, "a number not below 0"};

/// A TOML table being read: remembers which keys were taken, so that what is left over can be refused.
class Cursor {
 public:
  Cursor(const toml::table& table, std::string file, std::string path) : table_(&table), file_(std::move(file)), path_(std::move(path)) {}

  const std::string& file() const { return file_; }
  const std::string& path() const { return path_; }
  int line() const { return line_of(*table_); }
  bool has(std::string_view key) const { return table_->contains(key); }

  [[noreturn]] void fail(std::string_view key, const std::string& what) const {
    const auto* node = table_->get(key);
    throw BadFile(file_, node != nullptr ? line_of(*node) : line(), join(key), what);
  }

  std::string text(std::string_view key) { return text_of(need(key, "a text in quotes"), key); }
  std::string text_or(std::string_view key, std::string fallback = {}) { return has(key) ? text(key) : std::move(fallback); }

  double number(std::string_view key, const Bounds& bounds = any) { return number_of(need(key, bounds.right), key, bounds); }
  double number_or(std::string_view key, double fallback, const Bounds& bounds = any) { return has(key) ? number(key, bounds) : fallback; }
  std::optional<double> optional_number(std::string_view key, const Bounds& bounds = any) {
    return has(key) ? std::optional(number(key, bounds)) : std::nullopt;
  }
  bool flag_or(std::string_view key, bool fallback) {
    if (!has(key)) return fallback;
    const auto& node = need(key, "true or false");
    const auto v = node.value_exact<bool>();
    if (!v) fail(key, fmt::format("{}; true or false is wanted", found(node)));
    return *v;
  }

  std::vector<std::string> texts(std::string_view key, std::size_t at_most = 200) {
    std::vector<std::string> r;
    if (!has(key)) return r;
    for (const auto& node : list(key, "a list of texts", at_most)) r.push_back(text_of(node, key));
    return r;
  }
  std::vector<double> numbers(std::string_view key, const Bounds& bounds = any, std::size_t at_most = 200) {
    std::vector<double> r;
    if (!has(key)) return r;
    for (const auto& node : list(key, "a list of numbers", at_most)) r.push_back(number_of(node, key, bounds));
    return r;
  }
  std::array<double, 2> range(std::string_view key, const Bounds& bounds) {
    const auto r = numbers(key, bounds);
    if (r.size() != 2 || !(r[0] < r[1])) fail(key, "two numbers, the lower first, are wanted");
    return {r[0], r[1]};
  }
  /// Rows of exactly N numbers. `columns` names them in messages.
  template <std::size_t N>
  Rows<N> rows(std::string_view key, std::string_view columns) {
    Rows<N> r;
    if (!has(key)) return r;
    for (const auto& node : list(key, "a list of rows", 500)) {
      const auto* row = node.as_array();
      if (row == nullptr) throw BadFile(file_, line_of(node), join(key), fmt::format("{}; a row [{}] is wanted", found(node), columns));
      if (row->size() != N)
        throw BadFile(file_, line_of(node), join(key), fmt::format("row {} has {} numbers; {} are wanted: [{}]", r.size() + 1, row->size(), N, columns));
      auto& out = r.emplace_back();
      for (std::size_t i = 0; i < N; ++i) out[i] = number_of((*row)[i], key, any);
    }
    return r;
  }

  std::optional<Cursor> table(std::string_view key) {
    if (!has(key)) return std::nullopt;
    const auto& node = need(key, "a table");
    const auto* t = node.as_table();
    if (t == nullptr) fail(key, fmt::format("{}; a table is wanted", found(node)));
    return Cursor(*t, file_, join(key));
  }
  Cursor needed_table(std::string_view key) {
    need(key, "a table");
    return *table(key);
  }
  std::vector<Cursor> tables(std::string_view key, std::size_t at_most) {
    std::vector<Cursor> r;
    if (!has(key)) return r;
    for (const auto& node : list(key, "a list of tables", at_most)) {
      const auto* t = node.as_table();
      if (t == nullptr) throw BadFile(file_, line_of(node), join(key), fmt::format("{}; a table is wanted", found(node)));
      r.emplace_back(*t, file_, fmt::format("{}[{}]", join(key), r.size() + 1));
    }
    return r;
  }

  /// Call last: a key that nothing has read is an error.
  void finish() const {
    for (const auto& [key, node] : *table_)
      if (!taken_.contains(key.str())) {
        std::string known;
        for (const auto& k : asked_) {
          known += known.empty() ? "" : ", ";
          known += k;
        }
        throw BadFile(file_, static_cast<int>(key.source().begin.line), join(key.str()), fmt::format("unknown key; known here are: {}", known));
      }
  }
  /// Keys that may stand in the file but say nothing to the program.
  void ignore(std::string_view key) { mark(key); }

 private:
  static int line_of(const toml::node& n) { return static_cast<int>(n.source().begin.line); }
  std::string join(std::string_view key) const { return path_.empty() ? std::string(key) : fmt::format("{}.{}", path_, key); }

  void mark(std::string_view key) {
    taken_.emplace(key);
    asked_.emplace(key);
  }

  const toml::node& need(std::string_view key, std::string_view right) {
    mark(key);
    const auto* node = table_->get(key);
    if (node == nullptr) throw BadFile(file_, line(), join(key), fmt::format("missing; {} is wanted", right));
    return *node;
  }

  static std::string found(const toml::node& n) {
    if (const auto v = n.value_exact<std::string>()) return fmt::format("found the text \"{}\"", v->substr(0, 40));
    if (const auto v = n.value_exact<bool>()) return fmt::format("found {}", *v);
    if (const auto v = n.value<double>()) return fmt::format("found {}", *v);
    if (n.is_array()) return "found a list";
    if (n.is_table()) return "found a table";
    return "found a date or time";
  }

  std::string text_of(const toml::node& node, std::string_view key) const {
    const auto v = node.value_exact<std::string>();
    if (!v) throw BadFile(file_, line_of(node), join(key), fmt::format("{}; a text in quotes is wanted", found(node)));
    return *v;
  }

  double number_of(const toml::node& node, std::string_view key, const Bounds& bounds) const {
    const auto v = node.is_number() ? node.value<double>() : std::nullopt;
    if (!v) throw BadFile(file_, line_of(node), join(key), fmt::format("{}; {} is wanted", found(node), bounds.right));
    if (!std::isfinite(*v) || *v < bounds.low || *v > bounds.high || (bounds.open_low && *v == bounds.low))
      throw BadFile(file_, line_of(node), join(key), fmt::format("found {}; {} is wanted", *v, bounds.right));
    return *v;
  }

  const toml::array& list(std::string_view key, std::string_view right, std::size_t at_most) {
    const auto& node = need(key, right);
    const auto* array = node.as_array();
    if (array == nullptr) fail(key, fmt::format("{}; {} is wanted", found(node), right));
    if (array->size() > at_most) fail(key, fmt::format("{} entries; at most {} are taken", array->size(), at_most));
    return *array;
  }

  const toml::table* table_;
  std::string file_, path_;
  std::set<std::string, std::less<>> taken_, asked_;
};

}  // namespace zeotrope::data
