#pragma once

#include <stdexcept>
#include <string>
#include <utility>

namespace zeotrope {

/// Root of every error that the library throws. The message names the quantity, its value with
/// unit, what is allowed, and the fluid where there is one.
class Error : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

/// The caller's input cannot be read or makes no sense: unit, designation, composition, number.
class BadInput : public Error {
 public:
  using Error::Error;
};

/// The input is sound but lies outside the published range of an equation.
/// Most calls take an option that extrapolates; results are then marked.
class OutOfRange : public Error {
 public:
  using Error::Error;
};

/// What is asked for does not exist, e.g. a bubble point above the critical temperature.
class NoSolution : public Error {
 public:
  using Error::Error;
};

/// A solution should exist but the solver did not reach one that passes its checks.
class NotConverged : public Error {
 public:
  using Error::Error;
};

/// A coefficient file cannot be used. The message reads "FILE:LINE: KEY: what, and what would be right".
class BadFile : public Error {
 public:
  BadFile(std::string file, int line, std::string key, const std::string& what)
      : Error(compose(file, line, key, what)), file_(std::move(file)), line_(line), key_(std::move(key)) {}

  const std::string& file() const noexcept { return file_; }
  /// 1-based; 0 where the fault belongs to no line (a missing file or key).
  int line() const noexcept { return line_; }
  const std::string& key() const noexcept { return key_; }

 private:
  static std::string compose(const std::string& file, int line, const std::string& key, const std::string& what) {
    std::string s = file;
    // appended piece by piece: g++ 12 warns wrongly of overlap when a literal is joined to a temporary
    if (line > 0) {
      s += ':';
      s += std::to_string(line);
    }
    s += ": ";
    if (!key.empty()) s.append(key).append(": ");
    return s.append(what);
  }

  std::string file_;
  int line_;
  std::string key_;
};

}  // namespace zeotrope
