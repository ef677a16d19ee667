#include "sim/bench/bench.h"

#include <math.h>
#include <string.h>

#include "models/solution.h"

void bench_open_day(struct bench *b, double draws[][LANES])
{
    const struct bath *const bath = &b->design->plan->bath;
    FOR_LANES(l)
    {
        b->done_s[l] += b->clock_s[l];
        b->clock_s[l] = 0.0;
        b->day_K[l] = bath->day_u_K * draws[DRAWS_DAY_OFFSET][l];
        b->drift_K_s[l] = bath->drift_u_K_s * draws[DRAWS_DRIFT][l];
        b->bath_K[l] = bath->fluctuation_K * draws[DRAWS_BATH_START][l];
    }
}

/* Rounded to the nearest multiple of a resolution; 0 leaves it. Adding and
 * taking away 1.5 2^52 rounds to a whole number, half to even. */
static double rounded(double x, double resolution)
{
    const double big = 6755399441055744.0;
    return ((x / resolution + big) - big) * resolution;
}

static void thicken(const struct bench *b, struct bench_filled *f)
{
    const double reagent = 1.0 + b->design->plan->cleavage.reagent_viscosity * f->liquid->reagent;
    const double *const k = b->truth.interaction[f->series];
    FOR_LANES(l) f->thick[l] = reagent * (1.0 + solution_specific(b->design->plan->material.law, k[l], f->coil[l]));
}

/* A fresh filling: the liquid as made, and what the last filling of the day
 * left. Water and blank take the interaction of what they receive. */
LANES_WIDE static void pour(const struct bench *b, size_t filling, struct bench_filled *f)
{
    const struct design *const d = b->design;
    const struct notebook_filling *const now = &d->filling[filling];
    const size_t i = design_liquid_of(d, now);
    const bool first = filling == 0 || now[-1].day != now->day;
    const double r = first ? 0.0 : d->plan->habits.carry_over;
    f->liquid = &d->liquid[i];
    f->series = f->liquid->series < SERIES ? f->liquid->series : first ? INTACT : b->filled.series;
    FOR_LANES(l)
    {
        f->made_coil[l] = b->truth.coil[i][l];
        f->made_polymer[l] = b->truth.conc_kg_m3[i][l];
        f->coil[l] = (1.0 - r) * f->made_coil[l] + r * b->filled.made_coil[l];
        f->polymer[l] = (1.0 - r) * f->made_polymer[l] + r * b->filled.made_polymer[l];
    }
}

LANES_WIDE static void set_up(const struct bench *b, const struct draws_filling *draws, struct bench_filled *f)
{
    const struct habits *const h = &b->design->plan->habits;
    const struct tube *const tube = &b->design->plan->tube;
    const double pi = 3.14159265358979323846;
    const double reservoir_m3 = pi / 4.0 * tube->reservoir_bore_m * tube->reservoir_bore_m * tube->head_m;
    const double charge_u = tube->suspended_level ? 0.0 : h->charge_u_m3 / reservoir_m3;
    const bool polymer = f->liquid->conc_kg_m3 > 0.0;
    FOR_LANES(l)
    {
        f->constant[l] = tube->constant_m2_s2 *
                         tube_head_factor(h->tilt_u_rad * draws->once[DRAWS_TILT][l], tube->offset_m / tube->head_m, charge_u * draws->once[DRAWS_CHARGE][l]);
        f->slow[l] = 1.0 + h->filling_u * draws->once[DRAWS_FILLING_TIME][l];
        f->gradient_K[l] = b->design->plan->bath.gradient_u_K * draws->once[DRAWS_GRADIENT][l];
    }
    if (polymer) FOR_LANES(l) f->slow[l] *= b->truth.solution_slow[l];
}

/* The course that the liquid's temperature nears, D(s) - R tau_f, at a time of
 * the day: bath without x, gradient, and drift that lags behind. */
static double course_K(const struct bench *b, const struct bench_filled *f, int l, double clock_s)
{
    const struct habits *const h = &b->design->plan->habits;
    return h->temperature_K - b->truth.calibration_K[l] + b->day_K[l] + f->gradient_K[l] + b->drift_K_s[l] * (clock_s - h->lag_s);
}

/* Bath and liquid's answer to it over the time before the first run. */
static void step_before(struct bench *b, const struct bath_step *step, const struct draws_filling *draws)
{
    FOR_LANES(l)
    {
        const double n0 = draws->once[DRAWS_IDLE_X][l], n1 = draws->once[DRAWS_IDLE_L][l], x = b->bath_K[l], y = b->liquid_K[l];
        b->bath_K[l] = step->from_x[0] * x + step->noise[0][0] * n0;
        b->liquid_K[l] = step->from_x[1] * x + step->from_l[1] * y + step->noise[1][0] * n0 + step->noise[1][1] * n1;
    }
}

/* A fresh filling, from the end of the last one to the first run. The liquid
 * is poured at room temperature; its deviation from the course decays. */
LANES_WIDE static void wait_for(struct bench *b, const struct draws_filling *draws, const struct bench_filled *f)
{
    const struct design *const d = b->design;
    const struct habits *const h = &d->plan->habits;
    step_before(b, &d->idle, draws);
    FOR_LANES(l)
    {
        const double poured_s = b->clock_s[l] + h->clean_and_fill_s;
        b->lag_K[l] = (h->room_K - course_K(b, f, l, poured_s)) * d->lag_wait;
        b->clock_s[l] = poured_s + h->equilibrate_s;
    }
}

/* Solvent at room temperature is added to what is in the tube and mixed. What
 * was carried over is diluted with the rest. */
static void add_solvent(struct bench *b, size_t filling, const struct draws_filling *draws, const double delivery[LANES])
{
    const struct design *const d = b->design;
    const struct habits *const h = &d->plan->habits;
    struct bench_filled *const f = &b->filled;
    f->liquid = &d->liquid[design_liquid_of(d, &d->filling[filling])];
    const double kept = 1.0 - f->liquid->added_m3 / f->liquid->volume_m3; /* nominal volumes mix the temperatures */
    step_before(b, &f->liquid->addition, draws);
    FOR_LANES(l)
    {
        const double volume = f->volume_m3[l] + f->liquid->added_m3 + b->truth.pipette_m3[l] + d->plan->solutions.delivery_u_m3 * delivery[l];
        const double thinner = f->volume_m3[l] / volume;
        const double mixed_s = b->clock_s[l] + h->add_and_mix_s;
        f->volume_m3[l] = volume;
        f->coil[l] *= thinner;
        f->polymer[l] *= thinner;
        f->made_coil[l] *= thinner;
        f->made_polymer[l] *= thinner;
        b->lag_K[l] = (kept * b->lag_K[l] * d->lag_mix + (1.0 - kept) * (h->room_K - course_K(b, f, l, mixed_s))) * d->lag_wait;
        b->clock_s[l] = mixed_s + h->equilibrate_s;
    }
    thicken(b, f);
}

/* A fresh filling, or the charge of a loading. */
static void fill(struct bench *b, size_t filling, const struct draws_filling *draws, const double delivery[LANES])
{
    const struct design *const d = b->design;
    struct bench_filled f;
    pour(b, filling, &f);
    set_up(b, draws, &f);
    wait_for(b, draws, &f);
    FOR_LANES(l) f.volume_m3[l] = d->plan->tube.charge_m3 + b->truth.pipette_m3[l] + d->plan->solutions.delivery_u_m3 * delivery[l];
    thicken(b, &f);
    b->filled = f;
}

/* One run: its draws, the lanes in which it is made (1, else 0), and the
 * liquid's mean temperature over it. */
struct run {
    double (*draws)[LANES];
    double go[LANES], liquid_K[LANES];
};

/* The joint step of bath and liquid over one run and its reset. */
static inline void run_step(const struct bath_step *s, const struct bench *b, double n[][LANES], double out[BATH_OUTPUTS][LANES])
{
    const double *const x = b->bath_K, *const y = b->liquid_K;
    const double *const n0 = n[DRAWS_BATH], *const n1 = n[DRAWS_BATH + 1], *const n2 = n[DRAWS_BATH + 2], *const n3 = n[DRAWS_BATH + 3];
    double next[BATH_OUTPUTS][LANES];
    for (size_t i = 0; i < BATH_OUTPUTS; i++) {
        const double *const e = s->noise[i], from_x = s->from_x[i], from_l = s->from_l[i];
        FOR_LANES(l) next[i][l] = from_x * x[l] + from_l * y[l] + e[0] * n0[l] + e[1] * n1[l] + e[2] * n2[l] + e[3] * n3[l];
    }
    memcpy(out, next, sizeof next);
}

/* Temperatures of one run: the liquid's mean, and what is read. The state goes
 * on to the start of the next run in the lanes that `go`. */
LANES_WIDE static void run_temperatures(struct bench *b, const struct bench_filled *f, struct run *r, double read_K[LANES])
{
    double(*const n)[LANES] = r->draws;
    const double *const go = r->go;
    const struct plan *const p = b->design->plan;
    const struct design_liquid *const q = f->liquid;
    const double set_K = p->habits.temperature_K, lag_s = p->habits.lag_s, reading_u = p->thermometer.reading_u_K;
    const double half_s = 0.5 * q->nominal_s, step_s = q->nominal_s + p->habits.reset_s, lag_mean = q->lag_mean, lag_left = q->lag_left;
    double out[BATH_OUTPUTS][LANES], liquid[LANES], read[LANES];
    run_step(&q->step, b, n, out);
    FOR_LANES(l)
    {
        const double drifted = b->day_K[l] + b->drift_K_s[l] * (b->clock_s[l] + half_s);
        liquid[l] = set_K - b->truth.calibration_K[l] + drifted + f->gradient_K[l] - b->drift_K_s[l] * lag_s + b->lag_K[l] * lag_mean + out[BATH_L_MEAN][l];
        read[l] = set_K + drifted + out[BATH_READING][l] + reading_u * n[DRAWS_READING][l];
    }
    FOR_LANES(l)
    {
        /* a lane that stays has no draws for this run: nothing of it may be taken */
        b->bath_K[l] = go[l] != 0.0 ? out[BATH_X_NEXT][l] : b->bath_K[l];
        b->liquid_K[l] = go[l] != 0.0 ? out[BATH_L_NEXT][l] : b->liquid_K[l];
        b->lag_K[l] *= go[l] != 0.0 ? lag_left : 1.0;
        b->clock_s[l] += go[l] * step_s;
    }
    const double resolution = p->thermometer.resolution_K; /* on a Celsius scale */
    if (resolution > 0.0) FOR_LANES(l) read[l] = 273.15 + rounded(read[l] - 273.15, resolution);
    memcpy(r->liquid_K, liquid, sizeof liquid);
    memcpy(read_K, read, sizeof read);
}

/* The true efflux time of one run [s]. */
LANES_WIDE static void run_efflux(const struct bench *b, struct bench_filled *f, const double liquid_K[LANES], double out_s[LANES])
{
    const struct design *const d = b->design;
    const struct plan *const p = d->plan;
    const double dense = 1.0 + p->cleavage.reagent_density * f->liquid->reagent;
    const double swells = p->material.temperature_coefficient_1_K;
    const double weight = 1.0 - p->material.specific_volume_m3_kg * water_density(p->habits.temperature_K);
    double nu[LANES];
    if (swells != 0.0) {
        struct bench_filled warm = *f;
        FOR_LANES(l) warm.coil[l] *= exp(swells * (liquid_K[l] - p->habits.temperature_K));
        thicken(b, &warm);
        memcpy(f->thick, warm.thick, sizeof f->thick);
    }
    FOR_LANES(l) nu[l] = water_fit_viscosity(&d->water, liquid_K[l]) * f->thick[l] / (water_density(liquid_K[l]) * dense + weight * f->polymer[l]);
    if (p->tube.ends == TUBE_FLARED)
        FOR_LANES(l) out_s[l] = tube_efflux(f->constant[l], TUBE_FLARED, b->truth.kinetic[l], nu[l]);
    else
        FOR_LANES(l) out_s[l] = tube_efflux(f->constant[l], TUBE_SQUARE, b->truth.kinetic[l], nu[l]);
    FOR_LANES(l) out_s[l] *= f->slow[l];
}

/* What the stopwatch shows: bubbles, marks, hand, resolution. */
LANES_WIDE static void run_timing(const struct plan *p, double n[][LANES], double time_s[LANES])
{
    const double pi = 3.14159265358979323846, root2 = 1.41421356237309504880;
    const double neck_m2 = pi / 4.0 * p->tube.neck_bore_m * p->tube.neck_bore_m;
    const double marks = neck_m2 / p->tube.bulb_volume_m3 * root2 * p->timer.meniscus_u_m, hand_s = root2 * p->timer.hand_u_s;
    const double chance = p->habits.bubble_chance;
    FOR_LANES(l)
    if (n[DRAWS_BUBBLE][l] < chance) time_s[l] *= 1.0 - p->habits.bubble_delay * log1p(-n[DRAWS_BUBBLE][l] / chance);
    FOR_LANES(l) time_s[l] = time_s[l] * (1.0 + marks * n[DRAWS_MENISCUS][l]) + hand_s * n[DRAWS_HAND][l];
    const double resolution = p->timer.resolution_s;
    if (resolution > 0.0) FOR_LANES(l) time_s[l] = rounded(time_s[l], resolution);
}

/* The bath as it is. */
static double bath_now_K(const struct bench *b, int l)
{
    return b->design->plan->habits.temperature_K - b->truth.calibration_K[l] + b->day_K[l] + b->drift_K_s[l] * b->clock_s[l] + b->bath_K[l];
}

/* Run number `number` of a filling, in the lanes that go. */
static void make_run(struct bench *b, size_t filling, struct run *r, size_t number)
{
    struct bench_filled *const f = &b->filled;
    struct notebook_run *const entry = &notebook_runs(&b->book, filling)[number];
    struct bench_traced_run *const traced = b->trace ? &b->trace->run[filling * b->book.layout->stride + number] : NULL;
    if (traced) FOR_LANES(l) traced->bath_K[l] = bath_now_K(b, l);
    run_temperatures(b, f, r, entry->read_K);
    if (traced) memcpy(traced->liquid_K, r->liquid_K, sizeof traced->liquid_K);
    run_efflux(b, f, r->liquid_K, entry->time_s);
    run_timing(b->design->plan, r->draws, entry->time_s);
    notebook_bring_to_set(&b->design->assumed, entry);
    FOR_LANES(l) if (r->go[l] != 0.0) b->book.made[filling][l]++;
}

/* Spare runs in the lanes whose runs do not agree, while there are any left. */
static void make_spare_runs(struct bench *b, size_t filling, struct draws_filling *draws)
{
    const struct design *const d = b->design;
    const size_t planned = d->filling[filling].runs;
    bool agreed[LANES];
    notebook_agree(&d->assumed, &b->book, filling, agreed);
    for (size_t r = planned; r < planned + d->plan->habits.spare_runs; r++) {
        struct run spare = {.draws = draws->run[r]};
        bool any = false;
        FOR_LANES(l)
        {
            spare.go[l] = agreed[l] ? 0.0 : 1.0;
            b->spare_runs[l] += spare.go[l];
            any = any || !agreed[l];
            if (!agreed[l]) draws_spare(draws, l, r);
        }
        if (!any) return;
        make_run(b, filling, &spare, r);
        FOR_LANES(l) agreed[l] = agreed[l] || notebook_agrees(&d->assumed, &b->book, filling, l);
    }
}

void bench_fill(struct bench *b, size_t filling, struct draws_filling *draws, const double delivery[LANES])
{
    struct run run;
    if (b->trace) memcpy(b->trace->started_s[filling], b->clock_s, sizeof b->clock_s);
    if (b->design->filling[filling].added)
        add_solvent(b, filling, draws, delivery);
    else
        fill(b, filling, draws, delivery);
    memset(b->book.made[filling], 0, LANES);
    FOR_LANES(l) run.go[l] = 1.0;
    for (size_t r = 0; r < b->design->filling[filling].runs; r++) {
        run.draws = draws->run[r];
        make_run(b, filling, &run, r);
    }
    make_spare_runs(b, filling, draws);
}
