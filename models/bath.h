/* A thermostat bath and the liquid in the tube, over the steps of a bench day.
 *
 * The bath wanders about its mean as a stationary Ornstein-Uhlenbeck process
 * x(t) of standard deviation sigma and correlation time tau; the liquid
 * follows through the glass, tau_f dl/dt = x - l. The system (x, its integral,
 * l) is linear and Gaussian, so what a step needs is drawn jointly and exactly,
 * never by small steps.
 * Source: Gillespie, Phys. Rev. E 54 (1996) 2084 (x and its integral); the
 * liquid's row follows from the same linear system.
 * Checked: tests/unit/models/test_bath.c (rows computed apart, closed forms).
 * Left out: everything slower than a day but the day's own offset and drift. */
#ifndef VICINAL_MODELS_BATH_H
#define VICINAL_MODELS_BATH_H

enum bath_reads { BATH_READS_MEAN, BATH_READS_MIDDLE, BATH_READS_ENDS };

struct bath_times {
    double correlation_s, lag_s; /* tau and tau_f, both above zero */
};

/* Coefficients of one kind of step: with the state (x, l) before it and
 * standard normals n[], output i is
 *   from_x[i] x + from_l[i] l + sum_{j<=i} noise[i][j] n[j].
 * The outputs, in units of kelvin: */
enum { BATH_X_NEXT, BATH_L_NEXT, BATH_L_MEAN, BATH_READING, BATH_OUTPUTS };
struct bath_step {
    double from_x[BATH_OUTPUTS], from_l[BATH_OUTPUTS];
    double noise[BATH_OUTPUTS][BATH_OUTPUTS];
};

/* A run of run_s and the reset after it: state after the reset, mean of l over
 * the run, and what the thermometer shows of x over the run. sigma in K. */
struct bath_step bath_run(struct bath_times times, double sigma_K, double run_s, double reset_s, enum bath_reads reads);

/* Cleaning and filling, then the wait: x goes on, the liquid is poured after
 * empty_s with l = 0 and follows for wait_s. Only the first two outputs. */
struct bath_step bath_idle(struct bath_times times, double sigma_K, double empty_s, double wait_s);

/* Adding solvent to what is in the tube: x and l go on for mix_s, then the
 * share `kept` of the liquid, and of l with it, is left in the mixture, which
 * follows for wait_s. Only the first two outputs. */
struct bath_step bath_addition(struct bath_times times, double sigma_K, double mix_s, double wait_s, double kept);

#endif
