// Streams that would silently repeat draws, and paths that would not mean what they say.
//
// refused 1 (g++): use of deleted function 'leat::stream::stream(const leat::stream&)'
// refused 1 (clang++): call to deleted constructor of 'leat::stream'
// refused 2 (g++): use of deleted function 'leat::stream& leat::stream::operator=(
// refused 2 (clang++): overload resolution selected deleted operator '='
// refused 3 (g++): use of deleted function 'leat::thin_stream::thin_stream(const
// refused 3 (clang++): call to deleted constructor of 'leat::thin_stream'
// refused 4: a bool is no path part; write an integer or a text
// refused 5: a single character is no path part; write a text
// refused 6: a floating-point number is no path part; write an integer
// refused 7: a path part is an integer of up to 64 bits or a text; cast an enumeration to
// refused 8: a floating-point number is no path part; write an integer
// refused 10: nullptr is no path part; write an integer or a text
// refused 9: this engine has fewer than 128 bits of state, too few to give every path its

#include "leat/engines/lehmer.hpp"
#include "leat/engines/philox.hpp"
#include "leat/streams/source.hpp"

#include <utility>

#if !defined(REFUSED)
#define REFUSED 0
#endif

namespace {

enum class colour { red };

std::uint64_t first_word(leat::stream s) { return s(); }

} // namespace

int main() {
    leat::source study{1};
    leat::stream s = study.stream("a", 1);
    leat::stream t = study.stream("a", 2);
    leat::thin_stream thin = study.thin_stream("a", 1);

#if REFUSED == 1
    first_word(s);
#else
    first_word(s.replica());
    first_word(std::move(s));
#endif

#if REFUSED == 2
    s = t;
#else
    s = t.replica();
#endif

#if REFUSED == 3
    leat::thin_stream copy = thin;
#else
    leat::thin_stream copy = thin.replica();
#endif

#if REFUSED == 4
    t = study.stream("pump is on", true);
#else
    t = study.stream("pump is on", 1);
#endif

#if REFUSED == 5
    t = study.stream('a');
#else
    t = study.stream("a");
#endif

#if REFUSED == 6
    study = study.branch("hour", 1.5);
#else
    study = study.branch("half-hour", 3);
#endif

#if REFUSED == 7
    t = study.stream(colour::red);
#else
    t = study.stream(static_cast<int>(colour::red));
#endif

#if REFUSED == 8
    t = t.offspring(1.0f);
#else
    t = t.offspring(1);
#endif

#if REFUSED == 10
    t = study.stream("pump", nullptr);
#else
    t = study.stream("pump", "nothing");
#endif

#if REFUSED == 9
    auto e = study.engine<leat::minimal_standard>("a", 1);
#else
    auto e = study.engine<leat::philox4x64>("a", 1);
#endif

    return static_cast<int>((e() + copy.position() + t()) & 1);
}
