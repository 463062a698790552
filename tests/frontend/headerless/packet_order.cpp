#include "globals.h"
extern int g_table[TABLE_LEN];
static unsigned state[STATE_N] = {1, 2, 3};
const unsigned char order[] = {0, 1, 2};
struct Packet { unsigned char hdr[HDR_LEN]; payload_t body; } __attribute__((packed));
enum Mode { A = FIRST_MODE, B, C };
void fwd(Packet *in, Packet *out, int n, enum Mode m) { for (int i = 0; i < n; i++) { Packet p = in[i];
    switch (m) { case A: p.hdr[0] = state[i % STATE_N]; break; case B: p.body = convert(p.body);
    default: break; } out[order[i % 3]] = p; g_table[i] = p.hdr[1]; } }
