// Digests of streams: what a path leads to, and the words there.

#include "digest/digest.hpp"
#include "leat/engines/philox.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/source.hpp"

#include <limits>

namespace digests {
namespace {

template <class Stream>
void words(const char* name, Stream s) {
    digest d;
    for (int i = 0; i < 5000; ++i) {
        d.add(s());
    }
    s.seek(1000000007);
    for (int i = 0; i < 1000; ++i) {
        d.add(s());
    }
    d.add(leat::to_string(s.address()));
    print(false, name, d);
}

} // namespace

void streams() {
    const leat::source study{20261201};
    const leat::source text{"a study"};
    words("stream.seed", study.stream());
    words("stream.text_seed", text.stream());
    words("stream.negative_seed", leat::source{-20261201}.stream());
    words("stream.empty_text", leat::source{""}.stream("", ""));
    words("stream.name", study.stream("failures"));
    words("stream.index", study.stream("failures", 17));
    words("stream.largest_index",
          study.stream("failures", std::numeric_limits<std::uint64_t>::max()));
    words("stream.negative_index", study.stream("failures", -17));
    words("stream.long_path", study.stream(1, "two", 3, "a name of more than sixteen bytes", -5));
    words("stream.branch", study.branch("wind", 4).branch(5).stream("gusts", 6));
    words("stream.offspring", study.stream("failures", 17).offspring(3).offspring("agent"));
    words("stream.thin", study.thin_stream("failures", 18));

    digest d;
    auto philox = study.engine<leat::philox4x64>("engine", 1);
    auto xoshiro = study.engine<leat::xoshiro256_plus_plus>("engine", 1);
    for (int i = 0; i < 1000; ++i) {
        d.add(philox());
        d.add(xoshiro());
    }
    print(false, "stream.engine", d);
}

} // namespace digests
