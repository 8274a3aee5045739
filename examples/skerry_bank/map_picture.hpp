// The map of the farm: lease, turbines with the spacing they keep, port.

#ifndef SKERRY_BANK_MAP_PICTURE_HPP
#define SKERRY_BANK_MAP_PICTURE_HPP

#include <string>

#include "farm.hpp"
#include "input.hpp"

namespace skerry {

std::string map_picture(const input& in, const farm& place);

} // namespace skerry

#endif
