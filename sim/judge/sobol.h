/* Shares of a variance by exchanging one group of inputs at a time: Sobol's
 * indices, Jansen's estimators.
 * Source: Jansen, Comput. Phys. Commun. 117 (1999) 35; Saltelli et al., ibid.
 * 181 (2010) 259, table 2.
 * Checked: tests/unit/judge/test_sobol.c (Ishigami, Sobol's g, a linear case). */
#ifndef VICINAL_JUDGE_SOBOL_H
#define VICINAL_JUDGE_SOBOL_H

#include <stddef.h>

struct sobol_share {
    double value, se; /* se: Monte Carlo */
};
struct sobol {
    struct sobol_share first, total;
    size_t used; /* triples in which all three are numbers */
};

/* From n triples: f(A), f(B), and f of A with the group taken from B. */
struct sobol sobol_of(size_t n, const double *a, const double *b, const double *mixed);

#endif
