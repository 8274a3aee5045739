// Errors: what a refusal says, and the cold functions that say it.
//
// Every message begins `leat::NAME: ` and names the class, the parameter, its value and what is
// allowed. Where exceptions are switched off, the message goes to stderr and the program aborts.
//
// The types build on <exception> alone: <stdexcept> costs more than half of <random> to include.
// A refusal met during constant evaluation is a compile-time error at the call of `refuse`.

#ifndef LEAT_CORE_ERRORS_HPP
#define LEAT_CORE_ERRORS_HPP

#include <cstdint>
#include <cstdio>  // snprintf for values, fputs where exceptions are off
#include <cstdlib> // abort, strtod
#include <exception>

namespace leat {

/// The base of all errors leat throws. The text is held inside, so copying cannot fail.
class error : public std::exception {
public:
    /// With this text, cut after 383 characters.
    explicit error(const char* text) noexcept {
        std::size_t i = 0;
        for (; text[i] != '\0' && i + 1 < sizeof text_; ++i) {
            text_[i] = text[i];
        }
        text_[i] = '\0';
    }
    /// The text.
    [[nodiscard]] const char* what() const noexcept override { return text_; }

private:
    char text_[384] = {};
};

/// A parameter, seed, size or state outside what its class allows.
class invalid_parameter : public error {
public:
    using error::error;
};

/// Text that is not what it should be: an address, a number, a saved state.
class malformed_text : public error {
public:
    using error::error;
};

/// A rejection loop went on so long that a sound engine would do so with a probability below
/// 2^-100: the engine is broken (constant, or in a very short cycle).
class engine_stuck : public error {
public:
    using error::error;
};

/// A draw past the end of a stream, of its limit, or of a block.
class stream_exhausted : public error {
public:
    using error::error;
};

namespace detail {

/// Builds a message in a fixed buffer; what does not fit is cut.
class message {
public:
    message& text(const char* s) noexcept {
        while (*s != '\0' && size_ + 1 < sizeof buffer_) {
            buffer_[size_++] = *s++;
        }
        buffer_[size_] = '\0';
        return *this;
    }
    message& text(const char* s, std::size_t length) noexcept {
        for (std::size_t i = 0; i < length && size_ + 1 < sizeof buffer_; ++i) {
            buffer_[size_++] = s[i];
        }
        buffer_[size_] = '\0';
        return *this;
    }
    message& value(const char* s) noexcept { return text("\"").text(s).text("\""); }
    message& value(bool x) noexcept { return text(x ? "true" : "false"); }
    message& value(unsigned long long x) noexcept {
        char digits[32];
        std::snprintf(digits, sizeof digits, "%llu", x);
        return text(digits);
    }
    message& value(long long x) noexcept {
        char digits[32];
        std::snprintf(digits, sizeof digits, "%lld", x);
        return text(digits);
    }
    message& value(unsigned x) noexcept { return value(static_cast<unsigned long long>(x)); }
    message& value(unsigned long x) noexcept { return value(static_cast<unsigned long long>(x)); }
    message& value(int x) noexcept { return value(static_cast<long long>(x)); }
    message& value(long x) noexcept { return value(static_cast<long long>(x)); }
    /// A short %g form that reads back as the same double.
    message& value(double x) noexcept {
        char digits[40];
        for (int precision = 6; precision <= 17; ++precision) {
            std::snprintf(digits, sizeof digits, "%.*g", precision, x);
            if (std::strtod(digits, nullptr) == x) {
                break;
            }
        }
        for (char& c : digits) {
            if (c == '\0') {
                break;
            }
            if (c == ',') { // the decimal point of some locales
                c = '.';
            }
        }
        return text(digits);
    }
    message& value(float x) noexcept { return value(static_cast<double>(x)); }
    message& hex(std::uint64_t x) noexcept {
        char digits[32];
        const unsigned long long word = x; // what %llx prints, whatever 64 bits are called here
        std::snprintf(digits, sizeof digits, "%016llx", word);
        return text(digits);
    }
    [[nodiscard]] const char* c_str() const noexcept { return buffer_; }

private:
    char buffer_[384] = {};
    std::size_t size_ = 0;
};

/// Throws `Error` with the message or, without exceptions, prints it and aborts.
template <class Error>
[[noreturn, gnu::cold, gnu::noinline]] inline void raise(const message& m) {
#if defined(__cpp_exceptions)
    throw Error(m.c_str());
#else
    std::fputs(m.c_str(), stderr);
    std::fputc('\n', stderr);
    std::abort();
#endif
}

/// Refuses a parameter: "leat::NAME: PARAMETER = VALUE, ALLOWED".
/// `allowed` reads on from the value, as in "must be finite and above 0".
template <class Value>
[[noreturn, gnu::cold, gnu::noinline]] inline void refuse(const char* name, const char* parameter,
                                                          Value value, const char* allowed) {
    message m;
    m.text("leat::").text(name).text(": ").text(parameter).text(" = ");
    raise<invalid_parameter>(m.value(value).text(", ").text(allowed));
}

/// Refuses one entry of a list: "leat::NAME: PARAMETER[INDEX] = VALUE, ALLOWED".
[[noreturn, gnu::cold, gnu::noinline]] inline void refuse_entry(const char* name,
                                                                const char* parameter,
                                                                std::uint64_t index, double value,
                                                                const char* allowed) {
    message m;
    m.text("leat::").text(name).text(": ").text(parameter).text("[").value(index).text("] = ");
    raise<invalid_parameter>(m.value(value).text(", ").text(allowed));
}

/// Refuses one entry of a matrix: "leat::NAME: PARAMETER[ROW][COLUMN] = VALUE, ALLOWED".
[[noreturn, gnu::cold, gnu::noinline]] inline void
refuse_entry(const char* name, const char* parameter, std::uint64_t row, std::uint64_t column,
             double value, const char* allowed) {
    message m;
    m.text("leat::").text(name).text(": ").text(parameter).text("[").value(row).text("][");
    m.value(column).text("] = ");
    raise<invalid_parameter>(m.value(value).text(", ").text(allowed));
}

/// Refuses for a reason that is not one parameter's value: "leat::NAME: REASON".
[[noreturn, gnu::cold, gnu::noinline]] inline void refuse(const char* name, const char* reason) {
    message m;
    raise<invalid_parameter>(m.text("leat::").text(name).text(": ").text(reason));
}

/// Reports a rejection loop that no sound engine would have kept going.
[[noreturn, gnu::cold, gnu::noinline]] inline void stuck(const char* name) {
    message m;
    raise<engine_stuck>(m.text("leat::").text(name).text(
        ": the engine is stuck: it rejected every trial, which a sound engine does with a "
        "probability below 2^-100; is it constant, unseeded or scripted too short?"));
}

} // namespace detail
} // namespace leat

#endif
