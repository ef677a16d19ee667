/* Studies side by side: everything a study computes is computed for LANES
 * studies at once, in plain loops that a compiler turns into wide registers.
 * Lanes never mix, so the count changes no result. */
#ifndef VICINAL_BASE_LANES_H
#define VICINAL_BASE_LANES_H

enum { LANES = 8 };

#define FOR_LANES(l) for (int l = 0; l < LANES; l++)

/* A function worth compiling once more for processors with wider registers;
 * which one runs is settled at start. Products and sums are never fused
 * (-ffp-contract=off), so both give the same bits. */
#if defined(__x86_64__) && defined(__GNUC__) && !defined(__clang__) && !defined(__SANITIZE_ADDRESS__)
#define LANES_WIDE __attribute__((target_clones("arch=x86-64-v3", "default")))
#else
#define LANES_WIDE
#endif

#endif
