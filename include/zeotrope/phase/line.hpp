#pragma once

namespace zeotrope::phase {

/// The two lines that bound the two-phase region of a composition.
enum class Line { bubble, dew };

}  // namespace zeotrope::phase
