// Saves a stream and a law, restores them and draws on; prints the version.

#include "leat/distributions/normal.hpp"
#include "leat/state/json.hpp"
#include "leat/streams/source.hpp"
#include "leat/version.hpp"

#include <cstdio>

int main() {
    leat::stream s = leat::source{20261201}.stream("consumer", 1);
    const leat::normal law{3.0, 0.5};
    const double first = law(s);

    const nlohmann::json saved{{"stream", s}, {"law", law}};
    auto again = saved.at("stream").get<leat::stream>();
    const auto same_law = saved.at("law").get<leat::normal<>>();
    const double here = law(s);
    if (here == first || same_law(again) != here) {
        return 1;
    }
    std::puts(leat::version);
}
