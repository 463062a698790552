#include "wind_track.h"
static Mat3 mul(const Mat3 &a, const Mat3 &b) { Mat3 r; for (int i = 0; i < 3; i++) for (int j = 0; j < 3;
    j++) { r.m[i][j] = 0; for (int k = 0; k < 3; k++) r.m[i][j] += a.m[i][k] * b.m[k][j]; } return r; }
void track(const Meas *z, State *x, size_t n) { State s = x[0]; Mat3 P = Mat3::identity();
    for (size_t i = 0; i < n; ++i) { s = predict(s, DT); P = mul(P, P) + Q; Vec3 y = z[i].pos - s.pos;
    if (y.norm2() < GATE) { s.pos += K_GAIN * y; s.vel = s.vel + y * (K_GAIN / DT); } x[i] = s; } }
