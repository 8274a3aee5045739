#!/usr/bin/env python3
"""Writes the tables of the portable mathematics and of the two ziggurats.

Run from the top of the repository; needs mpmath (Debian: python3-mpmath). It writes

    include/leat/core/exponential_table.hpp    2^(j/128), with the part that rounding cut off
    include/leat/core/logarithm_table.hpp      -ln of 128 short reciprocals, and a polynomial
    include/leat/core/sine_table.hpp           the sine of j/128 of a turn
    include/leat/core/arctangent_table.hpp     the arctangent of j/64
    include/leat/core/log_gamma_table.hpp      ln Gamma on [1, 2], and Stirling's series
    include/leat/distributions/detail/ziggurat_table.hpp   layers of exp(-x^2/2) and exp(-x)

Everything is computed at 60 digits and rounded to the nearest double once, at the end. What each
table means stands in the header that uses it.
"""
import struct
import subprocess
from mpmath import mp, mpf, floor, log, exp, sin, atan, pi, loggamma, chebyfit, sqrt, erfc, bernoulli, zeta

mp.dps = 60


def double(x):
    """x rounded to the nearest double."""
    return float(mpf(x))  # mpmath rounds to nearest even


def literal(x):
    """A double as a C++ hex-float literal."""
    x = float(x)
    if x == 0:
        return "0.0"
    digits, exponent = x.hex().split("p")
    if "." in digits:
        digits = digits.rstrip("0").rstrip(".")
    return f"{digits}p{int(exponent)}"


def bits(x):
    return struct.unpack("<Q", struct.pack("<d", x))[0]


def from_bits(b):
    return struct.unpack("<d", struct.pack("<Q", b))[0]


def fixed(x, places):
    """x rounded to a multiple of 2^-places (as an exact mpf)."""
    return floor(mpf(x) * mpf(2) ** places + mpf(0.5)) / mpf(2) ** places


def write(path, guard, what, body):
    text = f"""// {what}
//
// Written by tests/reference/make_math_tables.py: do not edit.

#ifndef {guard}
#define {guard}

{body}
#endif
"""
    with open(path, "w") as f:
        f.write(text)
    subprocess.run(["clang-format", "-i", path], check=True)


def rows(values, per_line):
    out = []
    for i in range(0, len(values), per_line):
        out.append("    " + ", ".join(values[i : i + per_line]) + ",")
    return "\n".join(out)


def constant(name, value, comment):
    return f"inline constexpr double {name} = {literal(value)}; // {comment}\n"


def exponential():
    body = "namespace leat::detail {\n\n"
    step = log(2) / 128
    high = fixed(step, 41)
    body += constant("steps_per_log", double(1 / step), "128 / ln 2")
    body += constant("log_step_high", double(high), "ln 2 / 128 in a multiple of 2^-41")
    body += constant("log_step_low", double(step - high), "and the rest of it")
    body += """
/// 2^(j/128) = value * (1 + rest).
struct power_of_two_entry {
    double value;
    double rest;
};

inline constexpr power_of_two_entry power_of_two_table[128] = {
"""
    entries = []
    for j in range(128):
        t = mpf(2) ** (mpf(j) / 128)
        v = double(t)
        entries.append("{%s, %s}" % (literal(v), literal(double(t / mpf(v) - 1))))
    body += rows(entries, 2) + "\n};\n\n} // namespace leat::detail\n"
    write("include/leat/core/exponential_table.hpp", "LEAT_CORE_EXPONENTIAL_TABLE_HPP",
          "Powers of two in steps of 1/128, for core/exponential.hpp.", body)


def logarithm():
    # Interval i holds the mantissas whose bits lie in [first + i 2^45, first + (i + 1) 2^45).
    # The half step puts 1 inside an interval, so that numbers on both sides of 1 take ln 1 = 0.
    first = (bits(0.7) >> 45 << 45) + (1 << 44)
    body = "namespace leat::detail {\n\n"
    body += f"inline constexpr std::uint64_t log_first = 0x{first:016x}; // the bits of {from_bits(first)!r}\n"
    high = fixed(log(2), 42)
    body += constant("log_two_high", double(high), "ln 2 in a multiple of 2^-42")
    body += constant("log_two_low", double(log(2) - high), "and the rest of it")
    entries, widest = [], mpf(0)
    for i in range(128):
        low = mpf(from_bits(first + (i << 45)))
        end = mpf(from_bits(first + ((i + 1) << 45)))
        inverse = fixed(2 / (low + end), 12)
        if low < 1 < end:
            inverse = mpf(1)
        widest = max(widest, abs(low * inverse - 1), abs(end * inverse - 1))
        value = -log(inverse)
        high = fixed(value, 42)
        entries.append("{%s, %s, %s}" % (literal(inverse), literal(high), literal(double(value - high))))
    p = lambda r: (((log(1 + r) - r) / r + r / 2) / r / r) if abs(r) > mpf(10) ** -9 else mpf(1) / 3 - r / 4 + r * r / 5 - r**3 / 6
    coefficients = chebyfit(p, [-widest, widest], 6)[::-1]  # lowest degree first
    body += "\n/// (ln(1 + r) - r + r^2/2) / r^3 for |r| <= %s, lowest degree first.\n" % mp.nstr(widest, 4)
    body += "inline constexpr double log_polynomial[6] = {\n"
    body += rows([literal(double(c)) for c in coefficients], 3) + "\n};\n"
    body += """
/// A short number near the reciprocal of an interval's middle, and minus its logarithm: `high` is a
/// multiple of 2^-42, `low` the rest.
struct logarithm_entry {
    double reciprocal;
    double high;
    double low;
};

inline constexpr logarithm_entry logarithm_table[128] = {
"""
    body += rows(entries, 1) + "\n};\n\n} // namespace leat::detail\n"
    write("include/leat/core/logarithm_table.hpp", "LEAT_CORE_LOGARITHM_TABLE_HPP",
          "Reciprocals with their logarithms, for core/logarithm.hpp.", "#include <cstdint>\n\n" + body)


def sine():
    body = "namespace leat::detail {\n\n"
    body += constant("two_pi", double(2 * pi), "2 pi")
    body += constant("two_pi_rest", double(2 * pi - mpf(double(2 * pi))), "and what rounding cut off")
    body += """
/// sin(2 pi j / 128) = value + rest.
struct sine_entry {
    double value;
    double rest;
};

inline constexpr sine_entry sine_table[128] = {
"""
    entries = []
    for j in range(128):
        s = mpf(0) if j % 64 == 0 else sin(2 * pi * j / 128)
        v = double(s)
        entries.append("{%s, %s}" % (literal(v), literal(double(s - mpf(v)))))
    body += rows(entries, 2) + "\n};\n\n} // namespace leat::detail\n"
    write("include/leat/core/sine_table.hpp", "LEAT_CORE_SINE_TABLE_HPP",
          "The sine of 128 equal parts of a turn, for core/sine_cosine.hpp.", body)


def arctangent():
    body = "namespace leat::detail {\n\n"
    half = double(pi / 2)
    body += constant("half_pi", half, "pi / 2")
    body += constant("half_pi_rest", double(pi / 2 - mpf(half)), "and what rounding cut off")
    body += """
/// arctan(j / 64) = value + rest.
struct arctangent_entry {
    double value;
    double rest;
};

inline constexpr arctangent_entry arctangent_table[65] = {
"""
    entries = []
    for j in range(65):
        a = atan(mpf(j) / 64)
        v = double(a)
        entries.append("{%s, %s}" % (literal(v), literal(double(a - mpf(v)))))
    body += rows(entries, 2) + "\n};\n\n} // namespace leat::detail\n"
    write("include/leat/core/arctangent_table.hpp", "LEAT_CORE_ARCTANGENT_TABLE_HPP",
          "The arctangent of 65 ratios, for core/arctangent.hpp.", body)


def log_gamma():
    # ln Gamma(1.5 + t) = (t - 1/2) (t + 1/2) p(t) for |t| <= 1/2: p has no zero there.
    def p(t):
        t = mpf(t)
        if abs(abs(t) - mpf(0.5)) < mpf(10) ** -12:  # the zeros at 1 and 2: by the derivative
            from mpmath import digamma
            return digamma(1.5 + t) / (2 * t)
        return loggamma(1.5 + t) / ((t - 0.5) * (t + 0.5))

    coefficients = chebyfit(p, [-0.5, 0.5], 24)[::-1]
    body = "namespace leat::detail {\n\n"
    body += "/// ln Gamma(3/2 + t) / (t^2 - 1/4) for |t| <= 1/2, lowest degree first.\n"
    body += "inline constexpr double log_gamma_middle[24] = {\n"
    body += rows([literal(double(c)) for c in coefficients], 3) + "\n};\n\n"
    body += "/// B(2k) / (2k (2k - 1)), k = 1 to 9: Stirling's series in 1/x^(2k-1).\n"
    body += "inline constexpr double stirling_series[9] = {\n"
    body += rows([literal(double(bernoulli(2 * k) / (2 * k * (2 * k - 1)))) for k in range(1, 10)], 3)
    body += "\n};\n"
    body += "\n/// (ln Gamma(1 + 2x) - 2 ln Gamma(1 + x)) / x^2 as a power series in x: the coefficient of x^(n-2)\n"
    body += "/// is (-1)^n zeta(n) (2^n - 2) / n (Abramowitz and Stegun, 6.1.33).\n"
    body += "inline constexpr double weibull_spread[16] = {\n"
    body += rows([literal(double((-1) ** n * zeta(n) * (mpf(2) ** n - 2) / n)) for n in range(2, 18)], 3)
    body += "\n};\n"
    body += constant("half_log_two_pi", double(log(2 * pi) / 2), "ln(2 pi) / 2")
    body += "\n} // namespace leat::detail\n"
    write("include/leat/core/log_gamma_table.hpp", "LEAT_CORE_LOG_GAMMA_TABLE_HPP",
          "Polynomials of the logarithm of the gamma function, for core/log_gamma.hpp.", body)


def layers(density, inverse, tail_area, low, high, n=256):
    """Solves Marsaglia and Tsang's closing condition for the outermost edge r by bisection.
    Gives x[0..n], x[0] the width of the base as if it were a rectangle, x[1] = r, x[n] = 0."""

    def build(r):
        v = r * density(r) + tail_area(r)
        x = [v / density(r), r]
        for _ in range(n - 2):
            y = density(x[-1]) + v / x[-1]
            if y >= 1:
                return x, mpf(1)  # closed too soon: r is too small
            x.append(inverse(y))
        return x, density(x[-1]) + v / x[-1] - 1

    low, high = mpf(low), mpf(high)
    for _ in range(190):
        middle = (low + high) / 2
        if build(middle)[1] > 0:
            low = middle
        else:
            high = middle
    x, _ = build(high)
    return x + [mpf(0)]


def ziggurat():
    normal = layers(lambda x: exp(-x * x / 2), lambda y: sqrt(-2 * log(y)),
                    lambda r: sqrt(pi / 2) * erfc(r / sqrt(2)), 3, 4)
    exponential_ = layers(lambda x: exp(-x), lambda y: -log(y), lambda r: exp(-r), 7, 8)
    body = "#include <cstdint>\n\nnamespace leat::detail {\n\n"
    body += """/// One layer: the drawn number is (2 k + 1) * width with the 52-bit k of a word's upper bits, and is
/// accepted at once where the whole word is below `bar`, that is k below bar / 2^12.
struct ziggurat_layer {
    double width;
    std::uint64_t bar;
};

"""
    for name, x, f, what in (
        ("normal", normal, lambda t: exp(-t * t / 2), "exp(-x^2/2)"),
        ("exponential", exponential_, lambda t: exp(-t), "exp(-x)"),
    ):
        body += constant(f"{name}_tail", double(x[1]), "r, where the tail begins")
        body += f"\n/// Layers of {what} from the base (whose width is area / f(r)) to the top.\n"
        body += f"inline constexpr ziggurat_layer {name}_layers[256] = {{\n"
        entries = []
        for i in range(256):
            bar = int(floor(mpf(2) ** 52 * x[i + 1] / x[i])) << 12
            entries.append("{%s, 0x%016xu}" % (literal(double(x[i] / mpf(2) ** 53)), bar))
        body += rows(entries, 2) + "\n};\n\n"
        body += f"/// {what} at the right end of each layer, from r (layers 0 and 1) up; then 1.\n"
        body += f"inline constexpr double {name}_heights[257] = {{\n"
        heights = [f(x[1])] + [f(t) for t in x[1:]]
        body += rows([literal(double(h)) for h in heights], 4) + "\n};\n\n"
    body += "} // namespace leat::detail\n"
    write("include/leat/distributions/detail/ziggurat_table.hpp", "LEAT_DISTRIBUTIONS_DETAIL_ZIGGURAT_TABLE_HPP",
          "The layers of the two ziggurats, for normal and exponential.", body)


if __name__ == "__main__":
    exponential()
    logarithm()
    sine()
    arctangent()
    log_gamma()
    ziggurat()
