// The distribution of availability over the replications, for both designs.

#ifndef SKERRY_BANK_AVAILABILITY_PICTURE_HPP
#define SKERRY_BANK_AVAILABILITY_PICTURE_HPP

#include <string>
#include <vector>

#include "input.hpp"
#include "rows.hpp"
#include "summary.hpp"

namespace skerry {

std::string availability_picture(const input& in, const std::vector<replication_row>& rows,
                                 const study_summary& summary);

} // namespace skerry

#endif
