#include "collector.hpp"

#include <algorithm>
#include <exception>
#include <stdexcept>
#include <utility>

namespace skerry {
namespace {

constexpr int everything = -1; // below every replication's number

/// What the exception being handled says.
std::string reason() {
    try {
        throw;
    } catch (const std::exception& e) {
        return e.what();
    } catch (...) {
        return "an unknown error";
    }
}

} // namespace

collector::collector(row_set rows, collector_duties duties)
    : rows_(std::move(rows)), duties_(std::move(duties)) {
    finished_ = static_cast<int>(
        std::count_if(rows_.begin(), rows_.end(), [](const auto& row) { return row.has_value(); }));
}

std::vector<int> collector::missing() const {
    const std::lock_guard lock(mutex_);
    std::vector<int> numbers;
    for (std::size_t r = 0; r < rows_.size(); ++r) {
        if (!rows_[r]) {
            numbers.push_back(static_cast<int>(r));
        }
    }
    return numbers;
}

bool collector::wants(int replication) const {
    const std::lock_guard lock(mutex_);
    return !failed_ || replication < *failed_;
}

void collector::accept(const replication_row& row) noexcept {
    try {
        std::unique_lock lock(mutex_);
        rows_.at(static_cast<std::size_t>(row.replication)) = row;
        ++finished_;
        ++unsaved_;
        if (duties_.progress) {
            duties_.progress(finished_);
        }
        if (duties_.save && unsaved_ >= duties_.save_every && !saving_) {
            save(lock);
        }
    } catch (...) {
        stop(reason());
    }
}

/// Saves a copy, so that the others need not wait for the disk.
void collector::save(std::unique_lock<std::mutex>& lock) {
    const row_set copy = rows_;
    unsaved_ = 0;
    saving_ = true;
    lock.unlock();
    duties_.save(copy);
    lock.lock();
    saving_ = false;
}

void collector::fail(int replication, const std::string& why) noexcept {
    note(replication, "replication " + std::to_string(replication) + ": " + why);
}

void collector::stop(const std::string& why) noexcept { note(everything, why); }

void collector::note(int number, const std::string& why) noexcept {
    const std::lock_guard lock(mutex_);
    if (!failed_ || number < *failed_) {
        failed_ = number;
        failure_ = why;
    }
}

std::vector<replication_row> collector::finish() {
    std::unique_lock lock(mutex_);
    if (duties_.save && unsaved_ > 0 && failed_ != everything) {
        save(lock);
    }
    if (failed_) {
        throw std::runtime_error(failure_);
    }
    std::vector<replication_row> all;
    all.reserve(rows_.size());
    for (const auto& row : rows_) {
        all.push_back(row.value()); // a driver that left one out is found here
    }
    return all;
}

void attempt(const replication_function& run, collector& rows, int replication) noexcept {
    if (!rows.wants(replication)) {
        return;
    }
    std::optional<replication_row> row;
    try {
        row = run(replication);
    } catch (...) {
        rows.fail(replication, reason());
        return;
    }
    rows.accept(*row);
}

} // namespace skerry
