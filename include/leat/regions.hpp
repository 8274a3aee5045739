// Regions: points uniform by length, area or volume in a shape. One family of shapes a file.

#ifndef LEAT_REGIONS_HPP
#define LEAT_REGIONS_HPP

#include "leat/regions/affine_image.hpp"
#include "leat/regions/annulus.hpp"
#include "leat/regions/ball.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/box.hpp"
#include "leat/regions/cap.hpp"
#include "leat/regions/combination.hpp"
#include "leat/regions/cone.hpp"
#include "leat/regions/cylinder.hpp"
#include "leat/regions/directions.hpp"
#include "leat/regions/disk.hpp"
#include "leat/regions/ellipse.hpp"
#include "leat/regions/ellipsoid.hpp"
#include "leat/regions/polygon.hpp"
#include "leat/regions/polyline.hpp"
#include "leat/regions/rejection.hpp"
#include "leat/regions/rotation.hpp"
#include "leat/regions/sector.hpp"
#include "leat/regions/segment.hpp"
#include "leat/regions/shell.hpp"
#include "leat/regions/simplex.hpp"
#include "leat/regions/sphere.hpp"
#include "leat/regions/torus.hpp"
#include "leat/regions/triangle.hpp"
#include "leat/regions/triangle_mesh.hpp"

#endif
