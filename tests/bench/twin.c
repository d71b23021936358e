/* What a C programmer would write for two cases of the solver: a linear rod under a force, and a pile under ram,
   cushion and cap in Smith's ground. The same arithmetic and the same records as the kernels of solver/numerics:
   envelopes with their steps, ledger rows, frames, gauges. The benchmark compiles it and compares the answers too. */
#include <math.h>
#include <stdint.h>

typedef double *restrict arr;

struct twin {
    int64_t nodes, steps, stride, head, columns, shaft_first, shaft_nodes, gauges, parts;
    double dt;
    arr u, v, w, pulls, rest, stiff, push, mass, weight, load;
    arr low, low_step, high, high_step, speed, travel, ledger, sums;
    int64_t *restrict column;
    float *restrict area, *restrict frame_stress, *restrict frame_velocity, *restrict frame_moved;
    arr r, par, toe_par, toe_state, train_par, train_state, train_force, ram;
    int64_t *restrict gauge_node;
    arr gauge_weight, gauge;
    int64_t *restrict second;
};

enum { WORK, DASHPOTS, SLIP, DAMPING, IMPACT };

static void forces(int64_t links, arr u, arr stiff, arr force) {
    for (int64_t i = 0; i < links; i++)
        force[i] = stiff[i] * (u[i + 1] - u[i]);
}

/* Node i lies between pulls i and i + 1: a link of no force stands before the first node and after the last. */
static void velocities(int64_t n, arr push, arr weight, arr v, arr w, arr pulls) {
    for (int64_t i = 0; i < n; i++)
        w[i] = v[i] + push[i] * (pulls[i + 1] - pulls[i] + weight[i]);
}

static void extremes(int64_t links, double at, arr force, arr low, arr low_step, arr high, arr high_step) {
    for (int64_t i = 0; i < links; i++) {
        double f = force[i], lo = low[i], hi = high[i];
        int lower = f < lo - 1e-10 * fabs(lo), higher = f > hi + 1e-10 * fabs(hi);
        low_step[i] = lower ? at : low_step[i];
        low[i] = lower ? f : lo;
        high_step[i] = higher ? at : high_step[i];
        high[i] = higher ? f : hi;
    }
}

static void move(int64_t n, double dt, arr u, arr v, arr w, arr speed, arr travel) {
    for (int64_t i = 0; i < n; i++) {
        double mean = 0.5 * (v[i] + w[i]), now = u[i];
        speed[i] = mean > speed[i] ? mean : speed[i];
        travel[i] = now > travel[i] ? now : travel[i];
        u[i] = now + dt * w[i];
    }
}

enum { BLOCK = 416 };

/* Block by block, as solver/numerics/sweep.py does it. */
static void sweep(const struct twin *t, double *v, double *w, double at, int waiting) {
    int64_t links = t->nodes - 1;
    double *force = t->pulls + 1;
    for (int64_t a = 0; a < links; a += BLOCK) {
        int64_t b = a + BLOCK < links ? a + BLOCK : links, ahead = a ? a + 1 : 0, known = b < links ? b : b + 1;
        if (waiting)
            move(b + 1 - ahead, t->dt, t->u + ahead, w + ahead, v + ahead, t->speed + ahead, t->travel + ahead);
        forces(b - a, t->u + a, t->stiff + a, force + a);
        extremes(b - a, at, force + a, t->low + a, t->low_step + a, t->high + a, t->high_step + a);
        velocities(known - a, t->push + a, t->weight + a, v + a, w + a, t->pulls + a);
    }
}

static void record(const struct twin *t, double *row, int64_t frame, arr v, arr w, int piled) {
    int64_t n = t->nodes;
    double dt = t->dt, kinetic = 0, before = 0, gravity = 0, stored = 0, soil = 0, cushion = 0, taken = 0;
    arr u = t->u, force = t->pulls + 1, rest = t->rest, mass = t->mass, weight = t->weight, stiff = t->stiff;
    float *restrict fs = t->frame_stress + frame * t->columns, *restrict fv = t->frame_velocity + frame * t->columns,
          *restrict fu = t->frame_moved + frame * t->columns;
    int64_t first = t->column[0], columns = t->columns;
    if (t->column[columns - 1] - first == columns - 1) {
        for (int64_t c = 0, i = first; c < columns; c++)
            fs[c] = (float)force[i + c] / t->area[c];
        for (int64_t c = 0, i = first; c < columns; c++)
            fv[c] = (float)(0.25 * (v[i + c] + w[i + c] + v[i + c + 1] + w[i + c + 1]));
        for (int64_t c = 0, i = first; c < columns; c++)
            fu[c] = (float)(0.5 * (u[i + c] - rest[i + c] + u[i + c + 1] - rest[i + c + 1]));
    } else
        for (int64_t c = 0; c < columns; c++) {
            int64_t i = t->column[c];
            fs[c] = (float)force[i] / t->area[c];
            fv[c] = (float)(0.25 * (v[i] + w[i] + v[i + 1] + w[i + 1]));
            fu[c] = (float)(0.5 * (u[i] - rest[i] + u[i + 1] - rest[i + 1]));
        }
    for (int64_t i = 0; i < n; i++) {
        kinetic += mass[i] * w[i] * w[i];
        before += mass[i] * v[i] * v[i];
        gravity += weight[i] * (u[i] + 0.5 * dt * w[i] - rest[i]);
    }
    for (int64_t i = 0; i < n - 1; i++) {
        double d = u[i + 1] - u[i];
        stored += 0.5 * stiff[i] * d * d;
    }
    row[14] = 0.25 * (kinetic + before) + stored;
    for (int64_t i = 0; i < n - 1; i++)
        stored += 0.5 * force[i] * dt * (w[i + 1] - w[i]);
    if (piled) {
        arr inverse = t->par + 2 * t->shaft_nodes;
        for (int64_t j = 0; j < t->shaft_nodes; j++)
            soil += 0.5 * t->r[j] * t->r[j] * inverse[j];
        soil += 0.5 * t->toe_state[1] * t->toe_state[1] / t->toe_par[2];
        double k = t->train_par[0], unloading = t->train_par[1], largest = t->train_state[1];
        cushion = 0.5 * t->train_state[2] * t->train_state[2] / unloading;
        taken = 0.5 * k * largest * largest * (1 - k / unloading);
    }
    row[0] = 0.5 * kinetic;
    row[1] = stored;
    row[2] = 0;
    row[3] = soil;
    row[4] = cushion;
    row[5] = taken;
    row[6] = 0;
    row[7] = gravity;
    for (int i = 0; i < 5; i++)
        row[8 + i] = t->sums[i];
    row[13] = 0;
}

void linear(const struct twin *t) {
    int64_t n = t->nodes, head = t->head;
    double *v = t->v, *w = t->w;
    for (int64_t step = 0; step < t->steps; step++) {
        double pull = t->load[step];
        sweep(t, v, w, step, step > 0);
        w[head] += t->push[head] * pull;
        t->sums[WORK] += pull * 0.5 * (v[head] + w[head]) * t->dt;
        if (step % t->stride == 0)
            record(t, t->ledger + t->parts * (step / t->stride), step / t->stride, v, w, 0);
        double *swap = v;
        v = w;
        w = swap;
    }
    move(n, t->dt, t->u, w, v, t->speed, t->travel);
}

static void shaft(const struct twin *t, arr v, arr w) {
    int64_t n = t->shaft_nodes;
    arr strength = t->par, stiff = t->par + n, flexible = t->par + 2 * n, smith = t->par + 3 * n;
    arr viscous = t->par + 4 * n, push = t->push + t->shaft_first, r = t->r;
    double dt = t->dt, slip = 0, damped = 0;
    v += t->shaft_first;
    w += t->shaft_first;
    for (int64_t j = 0; j < n; j++) {
        double half = 0.5 * push[j], old = r[j], top = strength[j], k = stiff[j] * dt;
        double free = 0.5 * (v[j] + w[j]), now = old + 0.5 * k * v[j];
        now = now > top ? top : (now < -top ? -top : now);
        double c = smith[j] * fabs(now) + viscous[j];
        double new = old + k * (free - half * old) / (1.0 + half * (0.5 * k + c));
        new = new > top ? top : (new < -top ? -top : new);
        double mean = (free - half * 0.5 * (old + new)) / (1.0 + half * c);
        w[j] = 2.0 * mean - v[j];
        r[j] = new;
        slip += top * fabs(dt * mean - (new - old) * flexible[j]);
        damped += c * mean * mean;
    }
    t->sums[SLIP] += slip;
    t->sums[DAMPING] += damped * dt;
}

static void toe(const struct twin *t, arr v, arr w) {
    int64_t last = t->nodes - 1;
    arr par = t->toe_par, state = t->toe_state;
    double dt = t->dt, top = par[1], k = par[2], j = par[3], plastic = state[0], old = state[1], before = state[4];
    double half = 0.5 * t->push[last], goal = w[last] - half * before, moves = goal;
    double start = k * (t->u[last] - plastic), slope = 0.5 * k * dt, new = 0, acts = 0;
    if (start + slope * goal > 0) {
        double linear = 1 + half * (slope + j * start);
        if (j > 0 && slope > 0) {
            double square = half * j * slope, left = goal - half * start;
            moves = 2 * left / (linear + sqrt(fmax(linear * linear + 4 * square * left, 0)));
        } else
            moves = (goal - half * start) / linear;
        new = start + slope * moves;
        if (new > top) {
            new = top;
            moves = (goal - half * top) / (1 + half * j * top);
        }
        acts = new * (1 + j * moves);
        if (new <= 0 || acts <= 0) {
            moves = goal;
            new = fmax(fmin(start + slope * goal, top), 0);
            acts = 0;
        }
    }
    double slipped = new >= top ? t->u[last] + 0.5 * dt * moves - new / k - plastic : 0;
    if (slipped > 0)
        state[0] = plastic + slipped;
    state[1] = new;
    state[4] = acts;
    state[3] = acts > 0;
    double damped = 0.25 * dt * ((before - old) + (acts - new)) * (v[last] + moves);
    w[last] = moves;
    t->sums[SLIP] += top * fmax(slipped, 0);
    t->sums[DAMPING] += fmax(damped, 0);
    t->sums[IMPACT] += fmin(damped, 0);
}

static double cushion_force(double d, double k, double unloading, double largest, double e) {
    return fmax(fmin(k * d, unloading * (d - largest * (1 - e * e))), 0);
}

enum { OPEN, LOADING, UNLOADING, CLOSED };

static void branch(int which, const double *par, const double *state, double gap, double dt, double *a, double *b,
                   double *c) {
    if (which == CLOSED) {
        *a = 0;
        *b = 1;
        *c = gap / dt;
    } else if (which == OPEN) {
        *a = 1;
        *b = 0;
        *c = 0.5 * state[2];
    } else {
        double k = which == UNLOADING ? par[1] : par[0];
        double start = which == UNLOADING ? state[1] * (1 - par[2] * par[2]) : 0;
        *a = 1;
        *b = -0.25 * k * dt;
        *c = 0.5 * state[2] + 0.5 * k * (state[0] + 0.5 * dt * state[3] - start);
    }
}

static double misfit(int which, double force, double rel, int cushioned, const double *par, const double *state,
                     double gap, double dt) {
    if (!cushioned)
        return which == CLOSED ? fmax(0.5 * state[2] - force, 0) : (dt * rel > gap ? 1e300 : 0);
    double new = cushion_force(state[0] + 0.5 * dt * (state[3] + rel), par[0], par[1], state[1], par[2]);
    return fabs(force - 0.5 * (state[2] + new));
}

/* Ram, cushion, cap, and the bare face between cap and head. */
static void train(const struct twin *t, arr v, arr w) {
    static const int cushion_ways[3] = {LOADING, UNLOADING, OPEN}, contact_ways[2] = {OPEN, CLOSED};
    double dt = t->dt, *first = t->train_state, *second = t->train_state + 4, *force = t->train_force;
    double gap1 = t->u[1] - t->u[0], gap2 = t->u[2] - t->u[1];
    double p0 = t->push[0], p1 = t->push[1], p2 = t->push[2], rel1 = w[0] - w[1], rel2 = w[1] - w[2];
    first[3] = v[0] - v[1];
    second[3] = v[1] - v[2];
    double best1 = 0, best2 = 0, least = INFINITY;
    for (int i = 0; i < 3; i++) {
        double a1, b1, c1;
        branch(cushion_ways[i], t->train_par, first, gap1, dt, &a1, &b1, &c1);
        for (int j = 0; j < 2; j++) {
            double a2, b2, c2;
            branch(contact_ways[j], t->train_par + 3, second, gap2, dt, &a2, &b2, &c2);
            double m11 = a1 - b1 * (p0 + p1), m12 = b1 * p1, m21 = b2 * p1, m22 = a2 - b2 * (p1 + p2);
            double r1 = c1 - b1 * rel1, r2 = c2 - b2 * rel2, det = m11 * m22 - m12 * m21;
            if (det == 0)
                continue;
            double f1 = (r1 * m22 - m12 * r2) / det, f2 = (m11 * r2 - r1 * m21) / det;
            double wrong = misfit(cushion_ways[i], f1, rel1 - (p0 + p1) * f1 + p1 * f2, 1, t->train_par, first, gap1, dt);
            wrong += misfit(contact_ways[j], f2, rel2 + p1 * f1 - (p1 + p2) * f2, 0, t->train_par + 3, second, gap2, dt);
            if (wrong < least) {
                best1 = f1;
                best2 = f2;
                least = wrong;
            }
            if (least < 1e-9 * (fabs(f1) + fabs(f2)))
                goto found;
        }
    }
found:
    force[0] = best1;
    force[1] = best2;
    w[0] -= p0 * best1;
    w[1] += p1 * best1 - p1 * best2;
    w[2] += p2 * best2;
    rel1 = w[0] - w[1];
    rel2 = w[1] - w[2];
    first[0] += 0.5 * dt * (first[3] + rel1);
    first[2] = cushion_force(first[0], t->train_par[0], t->train_par[1], first[1], t->train_par[2]);
    first[1] = fmax(first[1], first[0]);
    t->sums[IMPACT] += 0.5 * dt * best2 * (second[3] + rel2);
    second[2] = fmax(2 * best2 - second[2], 0);
}

static void gauges(const struct twin *t, int64_t step, arr v, arr w) {
    double dt = t->dt;
    arr u = t->u, force = t->pulls + 1, rest = t->rest;
    for (int64_t g = 0; g < t->gauges; g++) {
        double f = 0, speed = 0, moved = 0, acc = 0, strain = 0;
        for (int r = 0; r < 2; r++) {
            const double *h = t->gauge_weight + (2 * g + r) * 7;
            int64_t i = t->gauge_node[2 * g + r];
            if (h[0] == 0)
                continue;
            double a = (w[i] - v[i]) / dt, reading = h[3] * a + h[4], stretch = 0;
            if (h[1] != 0) {
                reading += h[1] * force[i - 1];
                stretch += h[1] * (u[i] - u[i - 1]) * h[5];
            }
            if (h[2] != 0) {
                reading += h[2] * force[i];
                stretch += h[2] * (u[i + 1] - u[i]) * h[6];
            }
            f += h[0] * reading;
            strain += h[0] * stretch;
            speed += h[0] * 0.5 * (v[i] + w[i]);
            moved += h[0] * (u[i] - rest[i]);
            acc += h[0] * a;
        }
        double values[5] = {f, speed, moved, acc, strain};
        for (int q = 0; q < 5; q++)
            t->gauge[(5 * g + q) * t->steps + step] = values[q];
    }
}

void pile(const struct twin *t) {
    int64_t n = t->nodes, head = t->head;
    double *v = t->v, *w = t->w;
    for (int64_t step = 0; step < t->steps; step++) {
        sweep(t, v, w, step, step > 0);
        shaft(t, v, w);
        toe(t, v, w);
        train(t, v, w);
        /* a second blow, after which the envelopes of the first would be kept, does not come in this case */
        if (t->train_force[0] > 0) {
            if (t->second[2] == 0 && step - t->second[0] > t->second[1])
                t->second[2] = step;
            t->second[0] = step;
        }
        gauges(t, step, v, w);
        t->ram[step] = t->train_force[0];
        t->ram[t->steps + step] = 0.5 * (v[0] + w[0]);
        t->ram[2 * t->steps + step] = 0.5 * (v[head] + w[head]);
        if (step % t->stride == 0)
            record(t, t->ledger + t->parts * (step / t->stride), step / t->stride, v, w, 1);
        double *swap = v;
        v = w;
        w = swap;
    }
    move(n, t->dt, t->u, w, v, t->speed, t->travel);
}
