#pragma once

/// Thermodynamic properties of refrigerants and their blends from published equations of state.

#include "zeotrope/error.hpp"
#include "zeotrope/refrigerant.hpp"
#include "zeotrope/units.hpp"
