#pragma once

#include <vector>

#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/refrigerant.hpp"

namespace zeotrope::apply {

/// The cautions of fluids/cautions.toml that apply to a refrigerant, in the file's order.
/// `below_atmosphere`: the chart or reading has figures below ambient pressure; `near_critical`: it ends near or asks
/// above the critical point. BadInput where the file names a condition that is not known here.
std::vector<data::Caution> applicable_cautions(const Refrigerant& refrigerant, const data::Catalogue& catalogue, bool below_atmosphere, bool near_critical);

}  // namespace zeotrope::apply
