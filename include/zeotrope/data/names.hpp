#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace zeotrope::data {

/// Spelling-independent key of a designation or name: lower case, letters and digits only, the R of a refrigerant
/// number dropped ("R-454B", "454b", "r454B" -> "454b"; "R-1234ze(E)" -> "1234zee"; "R-C318" -> "c318").
std::string name_key(std::string_view name);

/// Up to `count` of `known` that are nearest to `wanted` by edit distance of their keys, nearest first;
/// far ones are left out.
std::vector<std::string> nearest_names(std::string_view wanted, const std::vector<std::string>& known, std::size_t count = 4);

}  // namespace zeotrope::data
