#include <string>

#include "bindings.hpp"
#include "zeotrope/error.hpp"

namespace zeotrope::python {

namespace {

/// Messages quote what the caller typed, cut to length, so a cut may fall within a character.
py::str text(const std::string& s) {
  auto* decoded = PyUnicode_DecodeUTF8(s.data(), static_cast<Py_ssize_t>(s.size()), "replace");
  if (decoded == nullptr) throw py::error_already_set();
  return py::reinterpret_steal<py::str>(decoded);
}

py::object type(const char* name) { return py::module_::import("zeotrope.errors").attr(name); }

void set(const char* name, const Error& e) { PyErr_SetObject(type(name).ptr(), text(e.what()).ptr()); }

void set(const BadFile& e) {
  const auto python = type("BadFile")(text(e.what()), text(e.file()), e.line(), text(e.key()));
  PyErr_SetObject(py::type::handle_of(python).ptr(), python.ptr());
}

}  // namespace

void bind_errors(py::module_&) {
  py::register_local_exception_translator([](std::exception_ptr p) {
    if (!p) return;
    try {
      std::rethrow_exception(p);
    } catch (const BadFile& e) {
      set(e);
    } catch (const BadInput& e) {
      set("BadInput", e);
    } catch (const OutOfRange& e) {
      set("OutOfRange", e);
    } catch (const NoSolution& e) {
      set("NoSolution", e);
    } catch (const NotConverged& e) {
      set("NotConverged", e);
    } catch (const Error& e) {
      set("Error", e);
    }
  });
}

}  // namespace zeotrope::python
