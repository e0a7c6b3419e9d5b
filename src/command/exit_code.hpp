#pragma once

namespace zeotrope::command {

/// What the command returns to the shell; scripts rely on these figures.
enum class ExitCode {
  ok = 0,
  internal = 1,      ///< a fault of the program or of the system
  usage = 2,         ///< the command line, a unit, a name or a number cannot be read or makes no sense
  no_state = 3,      ///< no such state, outside the published range, or not reached by the solver
  check_failed = 4,  ///< `verify` found a figure outside its agreement
  bad_file = 5,      ///< a coefficient file cannot be used
};

}  // namespace zeotrope::command
