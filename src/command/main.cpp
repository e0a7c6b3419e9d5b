#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <cstdio>
#include <charconv>
#include <cstdlib>
#include <exception>
#include <filesystem>
#include <regex>
#include <stdexcept>
#include <string>
#include <vector>

#include "command.hpp"
#include "layout.hpp"
#include "zeotrope/error.hpp"

namespace zeotrope::command {

namespace {

constexpr auto footer = R"~(Examples:
  zeotrope chart R-454B --temperature-unit F --pressure-unit psig
  zeotrope point R-410A --pressure "118 psig"
  zeotrope reading R-407C --gauge "4.5 bar(g)" --line 12C --suction
  zeotrope SUBCOMMAND --help

Exit codes:
  0  done
  1  internal fault, or a file or standard output cannot be written in full
  2  the command line, a unit, a name or a number makes no sense
  3  no such state, outside the published range, or not reached by the solver
  4  verify: a figure is not within its stated agreement
  5  a coefficient file cannot be used

Folders of coefficient files are searched in this order: --fluids, the environment variable ZEOTROPE_FLUIDS, the shipped one.)~";

void print(const std::string& text) {
  if (std::fwrite(text.data(), 1, text.size(), stdout) != text.size() || std::fflush(stdout) != 0)
    throw std::runtime_error("standard output cannot be written");
}

ExitCode fail(ExitCode code, const std::string& message) {
  fmt::print(stderr, "zeotrope: {}\n", printable(message));
  return code;
}

/// Reads a plain figure whatever the locale.
double number(const std::string& digits) {
  double v = 0;
  std::from_chars(digits.data(), digits.data() + digits.size(), v);
  return v;
}

/// The library speaks kelvin; on site Celsius is read.
std::string with_celsius(const std::string& message) {
  static const std::regex kelvin("([0-9]+(\\.[0-9]+)?) K\\b");
  std::string text;
  auto rest = message.cbegin();
  for (std::sregex_iterator it(message.cbegin(), message.cend(), kelvin), end; it != end; ++it) {
    text.append(rest, (*it)[0].second);
    text += fmt::format(" ({:.2f} \u00b0C)", number((*it)[1].str()) - 273.15);
    rest = (*it)[0].second;
  }
  return text.append(rest, message.cend());
}

/// "zeotrope chart" of the subcommand that was named, for a hint.
std::string called(const CLI::App& app) {
  const auto subs = app.get_subcommands();
  return subs.empty() ? app.get_name() : app.get_name() + " " + subs.front()->get_name();
}

ExitCode run(int argc, char** argv) {
  CLI::App app("Pressure-temperature charts, superheat and subcooling of refrigerants and their blends,\nfrom published equations of state.", "zeotrope");
  std::vector<std::string> folders;
  app.add_option("--fluids", folders, "folder of your own coefficient files, before the shipped ones; may be repeated")
      ->type_name("FOLDER")
      ->allow_extra_args(false);
  app.set_version_flag("--version", std::string("zeotrope " ZEOTROPE_VERSION), "print the version");
  app.footer(footer);
  app.set_help_flag("-h,--help", "print this help");
  app.require_subcommand(1);
  app.fallthrough();  // inherited: --fluids may also stand after the subcommand
  app.get_formatter()->column_width(36);
  const std::vector<Subcommand> subcommands{add_chart(app), add_point(app), add_reading(app), add_list(app), add_about(app), add_verify(app)};

  try {
    app.parse(argc, argv);
  } catch (const CLI::CallForHelp&) {
    print(app.help());
    return ExitCode::ok;
  } catch (const CLI::CallForVersion& e) {
    print(std::string(e.what()) + "\n");
    return ExitCode::ok;
  } catch (const CLI::ParseError& e) {
    return fail(ExitCode::usage, fmt::format("{}; see {} --help", e.what(), called(app)));
  }
  const data::Catalogue catalogue(std::vector<std::filesystem::path>(folders.begin(), folders.end()));
  for (const auto& s : subcommands)
    if (s.app->parsed()) {
      const auto result = s.run(catalogue);
      print(result.text);
      return result.code;
    }
  throw std::logic_error("no subcommand ran");
}

ExitCode guarded(int argc, char** argv) {
  try {
    return run(argc, argv);
  } catch (const BadFile& e) {
    return fail(ExitCode::bad_file, e.what());
  } catch (const BadInput& e) {
    return fail(ExitCode::usage, e.what());
  } catch (const Error& e) {  // OutOfRange, NoSolution, NotConverged
    return fail(ExitCode::no_state, with_celsius(e.what()));
  } catch (const std::runtime_error& e) {  // of the system: a disc that is full, a folder that cannot be read
    return fail(ExitCode::internal, e.what());
  } catch (const std::exception& e) {
    return fail(ExitCode::internal, fmt::format("internal fault: {}", e.what()));
  }
}

}  // namespace

}  // namespace zeotrope::command

int main(int argc, char** argv) { return static_cast<int>(zeotrope::command::guarded(argc, argv)); }
