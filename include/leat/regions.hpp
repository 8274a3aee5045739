// Regions: points uniform by length, area or volume in a shape. One family of shapes a file.

#ifndef LEAT_REGIONS_HPP
#define LEAT_REGIONS_HPP

#include "leat/regions/bounds.hpp"
#include "leat/regions/disk.hpp"
#include "leat/regions/ellipse.hpp"

#endif
