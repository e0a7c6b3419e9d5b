#pragma once

// Catch2 as the distribution has it: 2.13 (Debian 12) or 3 (Debian 13), made to look like 2.13 where they differ.
#if __has_include(<catch2/catch_all.hpp>)
#include <catch2/catch_all.hpp>
using Catch::Approx;
namespace Catch {
inline auto Contains(const std::string& part) { return Matchers::ContainsSubstring(part); }
}  // namespace Catch
#else
#include <catch2/catch.hpp>
#endif
