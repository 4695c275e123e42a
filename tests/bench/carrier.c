/*
 * The carrier datapath of one plan over the samples of a file, with a checksum over its nodes: the yardstick for the
 * replay's throughput. It covers the sign detector on QPSK, order 2, one update a symbol, rounding to nearest and
 * saturation; words.h holds the plan's integers and is written beside it.
 *
 * carrier <file of int16 pairs> <symbols in it> <passes>; prints the seconds that the passes took, and the checksum.
 */
#define _POSIX_C_SOURCE 199309L
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#include "words.h"

static int64_t rounded(int64_t x, int shift)
{
    if (shift <= 0) return x * (INT64_C(1) << -shift);
    return (x + (INT64_C(1) << (shift - 1))) >> shift;
}

static int64_t saturated(int64_t x, int width)
{
    const int64_t top = INT64_C(1) << (width - 1);
    return x >= top ? top - 1 : x < -top ? -top : x;
}

struct carrier {
    uint64_t phase;
    int64_t acc;
    int64_t line[DELAY + 1];
    int place, stage, symbols;
    uint32_t a, b;
};

static void checksum(struct carrier *s, uint32_t z_i, uint32_t z_q, uint32_t e, uint32_t w)
{
    uint32_t a = (s->a ^ z_i) * UINT32_C(0x9e3779b1);
    uint32_t b = (s->b ^ z_q) * UINT32_C(0x85ebca77);
    a = ((a ^ (a >> 15)) + e) * UINT32_C(0xc2b2ae3d);
    b = ((b ^ (b >> 13)) + (uint32_t)s->acc) * UINT32_C(0x27d4eb2f);
    a = (a ^ (a >> 16) ^ w) * UINT32_C(0x165667b1);
    b = (b ^ (b >> 15) ^ (uint32_t)s->phase) * UINT32_C(0x9e3779b1);
    b ^= a >> 11;
    s->a = a + b;
    s->b = b;
}

static void step(struct carrier *s, int64_t x_i, int64_t x_q)
{
    const struct gains *g = &stages[s->stage];
    const uint64_t index = s->phase >> (NCO_BITS - PHASE_BITS);
    const int64_t c = cosine[index], n = sine[index];
    const int64_t z_i = saturated(rounded(x_i * c + x_q * n, TABLE_BITS - 2), SAMPLE_BITS);
    const int64_t z_q = saturated(rounded(x_q * c - x_i * n, TABLE_BITS - 2), SAMPLE_BITS);
    const int64_t value = (z_i < 0 ? -z_q : z_q) - (z_q < 0 ? -z_i : z_i);
    const int64_t e = saturated(rounded(value, ERROR_SHIFT), ERROR_BITS);
    s->line[s->place] = e;
    s->place = s->place == DELAY ? 0 : s->place + 1;
    const int64_t d = s->line[s->place];
    const int64_t acc = s->acc + saturated(rounded(d * g->i, g->i_shift), INTEGRATOR_BITS);
    s->acc = acc > LIMIT ? LIMIT : acc < -LIMIT ? -LIMIT : acc;
    const int64_t w = saturated(rounded(d * g->p, g->p_shift), NCO_BITS) + (s->acc >> GUARD_BITS);
    s->phase = (s->phase + FCW + (uint64_t)w) & (UINT64_MAX >> (64 - NCO_BITS));
    s->symbols += 1;
    if (g->symbols > 0 && s->symbols >= g->symbols) {
        s->stage += 1;
        s->symbols = 0;
    }
    checksum(s, (uint32_t)z_i, (uint32_t)z_q, (uint32_t)e, (uint32_t)w);
}

static double seconds(void)
{
    struct timespec t;
    clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

int main(int argc, char **argv)
{
    if (argc != 4) return 2;
    const size_t count = (size_t)strtoul(argv[2], NULL, 10);
    int16_t *x = malloc(count * 2 * sizeof *x);
    FILE *file = fopen(argv[1], "rb");
    if (x == NULL || file == NULL || fread(x, 2 * sizeof *x, count, file) != count) return 1;
    fclose(file);
    struct carrier s = { .a = UINT32_C(0x243f6a88), .b = UINT32_C(0x85a308d3) };
    const double begin = seconds();
    for (long pass = strtol(argv[3], NULL, 10); pass > 0; pass--)
        for (size_t k = 0; k < count; k++) step(&s, x[2 * k], x[2 * k + 1]);
    printf("%.9f %08x%08x\n", seconds() - begin, (unsigned)s.a, (unsigned)s.b);
    free(x);
    return 0;
}
