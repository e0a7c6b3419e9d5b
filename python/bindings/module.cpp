#include "bindings.hpp"

PYBIND11_MODULE(_core, m) {
  using namespace zeotrope::python;
  m.doc() = "Compiled part of zeotrope; use the names of the package `zeotrope`.";
  m.attr("__version__") = ZEOTROPE_VERSION;
  bind_errors(m);
  bind_units(m);
  bind_refrigerant(m);
  bind_chart(m);
  bind_kernel(m);
}
