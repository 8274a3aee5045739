// The version of leat, in one place: CMake and pkg-config read it from here.
//
// What a given seed yields changes only with LEAT_VERSION_MAJOR (promise P7).

#ifndef LEAT_VERSION_HPP
#define LEAT_VERSION_HPP

// Macros, so that a program can test them with #if.
/// Changes where a seed's values do, or where programs must be edited.
#define LEAT_VERSION_MAJOR 0
/// Changes with what is added; below 1.0 it counts as the major one.
#define LEAT_VERSION_MINOR 1
/// Changes with repairs.
#define LEAT_VERSION_PATCH 0

#define LEAT_DETAIL_TEXT_OF(x) #x
#define LEAT_DETAIL_TEXT(x) LEAT_DETAIL_TEXT_OF(x)

/// Everything that leat offers.
namespace leat {

/// "MAJOR.MINOR.PATCH", to be kept with results.
inline constexpr char version[] = LEAT_DETAIL_TEXT(LEAT_VERSION_MAJOR) "." LEAT_DETAIL_TEXT(
    LEAT_VERSION_MINOR) "." LEAT_DETAIL_TEXT(LEAT_VERSION_PATCH);

} // namespace leat

#undef LEAT_DETAIL_TEXT
#undef LEAT_DETAIL_TEXT_OF

#endif
