#pragma once

#include <pybind11/pybind11.h>

/// One function per subject; module.cpp calls them in the order in which they need each other's types.
namespace zeotrope::python {

namespace py = pybind11;

void bind_errors(py::module_& m);
void bind_units(py::module_& m);
void bind_refrigerant(py::module_& m);
void bind_chart(py::module_& m);
void bind_kernel(py::module_& m);

/// Calls that compute or read files let other threads run.
using Unlocked = py::call_guard<py::gil_scoped_release>;

}  // namespace zeotrope::python
