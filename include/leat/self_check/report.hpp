// What a self-check found: a short list of findings, each with what it means and what to do.
//
// A report is a plain value without a heap, so that making one cannot fail; only `to_string`
// allocates. Findings beyond its capacity are counted and left out.

#ifndef LEAT_SELF_CHECK_REPORT_HPP
#define LEAT_SELF_CHECK_REPORT_HPP

#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"

#include <cstddef>
#include <cstdint>
#include <iosfwd>
#include <span>
#include <string>

namespace leat {

/// Thrown by `self_check_or_throw`; names the first failure.
class self_check_failed : public error {
public:
    using error::error;
};

/// One thing found. All texts are literals: they live as long as the program.
struct self_check_finding {
    const char* check;   ///< what was looked at, as "rounding mode"
    const char* found;   ///< what stands there, or which digest differs
    const char* meaning; ///< what it does to results
    const char* remedy;  ///< what to do about it
    bool failed;         ///< false for a note, which fails nothing
};

/// The result of `self_check()`. True (`ok()`) if nothing failed; there may still be notes.
class self_check_report {
public:
    /// How many findings it has room for: more than all checks together can find.
    static constexpr std::size_t capacity = 256;

    /// Whether nothing failed.
    [[nodiscard]] constexpr bool ok() const noexcept { return failures_ == 0; }
    /// The same.
    constexpr explicit operator bool() const noexcept { return ok(); }

    /// What was found, failures and notes, in the order in which it was looked at.
    [[nodiscard]] constexpr std::span<const self_check_finding> findings() const noexcept {
        return {findings_, size_};
    }
    /// How many failed, findings left out for want of room included.
    [[nodiscard]] constexpr std::uint64_t failures() const noexcept { return failures_; }
    /// How many findings were left out.
    [[nodiscard]] constexpr std::uint64_t left_out() const noexcept { return left_out_; }

    /// Takes a finding in, or counts it where there is no room.
    constexpr void add(const self_check_finding& finding) noexcept {
        failures_ += finding.failed ? 1u : 0u;
        if (size_ == capacity) {
            ++left_out_;
        } else {
            findings_[size_++] = finding;
        }
    }

private:
    self_check_finding findings_[capacity] = {};
    std::size_t size_ = 0;
    std::uint64_t failures_ = 0;
    std::uint64_t left_out_ = 0;
};

namespace detail {

/// Throws self_check_failed if anything failed.
inline void throw_failure(const self_check_report& report) {
    for (const self_check_finding& finding : report.findings()) {
        if (finding.failed) {
            message m;
            m.text("leat::self_check: ").text(finding.check).text(": ").text(finding.found);
            if (report.failures() > 1) {
                const unsigned long long others = report.failures() - 1;
                m.text(" (and ").value(others).text(" more)");
            }
            m.text(": ").text(finding.meaning).text("; to do: ").text(finding.remedy);
            raise<self_check_failed>(m);
        }
    }
}

/// Gives the report's text to put(const char*), piece by piece, lines with their ends. Findings of
/// one check with one meaning share a paragraph.
template <class Put>
void write_report(const self_check_report& report, Put put) {
    put(report.ok() ? "leat self-check: passed\n" : "leat self-check: FAILED\n");
    const auto findings = report.findings();
    for (std::size_t i = 0; i < findings.size();) {
        const self_check_finding& first = findings[i];
        put(first.failed ? "- failed: " : "- note: ");
        put(first.check);
        put(": ");
        put(first.found);
        for (++i; i < findings.size() && findings[i].meaning == first.meaning; ++i) {
            put(", ");
            put(findings[i].found);
        }
        put("\n    it means: ");
        put(first.meaning);
        put("\n    to do: ");
        put(first.remedy);
        put("\n");
    }
    if (report.left_out() != 0) {
        put("- and more, left out\n");
    }
}

} // namespace detail

/// The report in some lines of text, the last one ended.
inline std::string to_string(const self_check_report& report) {
    std::string text;
    detail::write_report(report, [&text](const char* piece) { text += piece; });
    return text;
}

/// Writes the same text.
template <class Char, class Traits>
std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                             const self_check_report& report) {
    detail::write_report(report, [&os](const char* piece) {
        for (; *piece != '\0'; ++piece) {
            detail::write_char(os, *piece);
        }
    });
    return os;
}

} // namespace leat

#endif
