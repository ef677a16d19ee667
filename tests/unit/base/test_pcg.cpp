// The program's 128-bit step under the published XSL-RR output, against O'Neill's own library (libpcg-cpp-dev 0.98.1,
// which has no DXSM). TEXT: every output and state to the bit. The last line is `N passed, N failed`.
#include <cstdint>
#include <cstdio>

#include <pcg_random.hpp>

extern "C" {
#include "sim/base/streams.h"
}

namespace
{

const streams_u128 multiplier = streams_u128(UINT64_C(0x2360ed051fc65da4)) << 64 | UINT64_C(0x4385df649fccf645);

int passed = 0, failed = 0;

void check(bool good, const char *what, unsigned long long which)
{
    good ? ++passed : ++failed;
    if (!good)
        std::printf("FAIL %s %llu\n", what, which);
}

std::uint64_t xsl_rr(streams_u128 state)
{
    const std::uint64_t folded = std::uint64_t(state >> 64) ^ std::uint64_t(state);
    const unsigned turn = unsigned(state >> 122);
    return folded >> turn | folded << (-turn & 63U);
}

// 1000 outputs side by side.
bool same_outputs(pcg64 &engine, streams_u128 &state, streams_u128 increment)
{
    for (int i = 0; i < 1000; i++) {
        state = streams_step(state, multiplier, increment);
        if (engine() != xsl_rr(state))
            return false;
    }
    return true;
}

// The reference seeding: a step from 0, the seed added, a step.
streams_u128 seeded_state(streams_u128 seed, streams_u128 increment)
{
    return streams_step(streams_step(0, multiplier, increment) + seed, multiplier, increment);
}

void seeding()
{
    for (std::uint64_t i = 0; i < 40; i++)
        for (std::uint64_t sequence : {std::uint64_t(0), std::uint64_t(54), ~std::uint64_t(0)}) {
            const streams_u128 seed = streams_u128(i * i) * 1000003, increment = streams_u128(sequence) << 1 | 1;
            streams_u128 state = seeded_state(seed, increment);
            pcg64 engine(seed, sequence);
            check(same_outputs(engine, state, increment), "seeding", i);
        }
}

// The seed that leads to a state: the two steps undone.
streams_u128 seed_of(streams_u128 state, streams_u128 increment)
{
    streams_u128 inverse = multiplier; // Newton's iteration modulo 2^128
    for (int i = 0; i < 7; i++)
        inverse *= 2 - multiplier * inverse;
    return (state - increment) * inverse - increment;
}

// The library started from the states of our own keyed streams; both end in one state, too.
void keyed()
{
    for (std::uint64_t study = 0; study < 200; study++) {
        const streams_state ours =
            streams_open(streams_study_key(1, study), STREAMS_FILLING, streams_place{0, 0, 2, unsigned(study % 7), 1});
        streams_u128 state = ours.state;
        pcg64 engine(seed_of(state, ours.increment), ours.increment >> 1);
        check(same_outputs(engine, state, ours.increment), "course", study);
        check(engine == pcg64(seed_of(state, ours.increment), ours.increment >> 1), "state after it", study);
    }
}

// The library jumps ahead by powers of two: our steps must arrive there.
void far_ahead()
{
    const streams_u128 increment = 109;
    streams_u128 state = seeded_state(42, increment);
    pcg64 engine(42, 54);
    engine.advance(1000000);
    for (int i = 0; i < 1000000; i++)
        state = streams_step(state, multiplier, increment);
    check(engine == pcg64(seed_of(state, increment), 54), "a million ahead", 0);
}

} // namespace

int main()
{
    seeding();
    keyed();
    far_ahead();
    std::printf("%d passed, %d failed\n", passed, failed);
    return failed ? 1 : 0;
}
