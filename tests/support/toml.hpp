#pragma once

// As the library's reader includes it (src/data/toml_cursor.hpp): toml++ is inline code, and a translation unit with its
// assertions on would put them into the whole program.
#define TOML_ASSERT(expr) static_cast<void>(0)
#include <toml++/toml.h>
