// Shares independent tasks among threads, so that the result does not depend on how many.

#ifndef SKERRY_BANK_WORKERS_HPP
#define SKERRY_BANK_WORKERS_HPP

#include <functional>

namespace skerry {

/// Calls task(0) .. task(count - 1), each once, on so many threads; whoever is free takes the next
/// number. `finished(n)` is called in the calling thread now and then, n tasks being done. If tasks
/// throw, no further ones are begun, and the error of the lowest-numbered is thrown again here.
void share_out(int count, int threads, const std::function<void(int)>& task,
               const std::function<void(int)>& finished);

} // namespace skerry

#endif
