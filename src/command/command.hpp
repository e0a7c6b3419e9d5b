#pragma once

#include <CLI/CLI.hpp>
#include <functional>
#include <string>

#include "exit_code.hpp"
#include "zeotrope/data/catalogue.hpp"

namespace zeotrope::command {

/// What a subcommand made. Printed only when it is complete, so that an error leaves nothing on standard output.
struct Result {
  std::string text;
  ExitCode code = ExitCode::ok;
};

struct Subcommand {
  CLI::App* app;
  std::function<Result(const data::Catalogue&)> run;
};

Subcommand add_chart(CLI::App& app);
Subcommand add_point(CLI::App& app);
Subcommand add_reading(CLI::App& app);
Subcommand add_list(CLI::App& app);
Subcommand add_about(CLI::App& app);
Subcommand add_verify(CLI::App& app);

}  // namespace zeotrope::command
