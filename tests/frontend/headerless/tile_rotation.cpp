#include "tiles.h"
static void load_tile(const elem_t *src, elem_t tile[TH][TW], int r, int c, int pitch) { for (int i = 0;
    i < TH; i++) memcpy(tile[i], &src[(r + i) * pitch + c], TW * sizeof(elem_t)); }
static void store_tile(elem_t *dst, const elem_t tile[TH][TW], int r, int c, int pitch) { for (int i = 0;
    i < TH; i++) for (int j = 0; j < TW; j++) *(dst + (r + i) * pitch + c + j) = tile[i][j]; }
extern "C" void rot(const elem_t *in, elem_t *out, int h, int w) { elem_t t[TH][TW], u[TW][TH];
    for (int r = 0; r < h; r += TH) for (int c = 0; c < w; c += TW) { load_tile(in, t, r, c, w);
    for (int i = 0; i < TH; i++) for (int j = 0; j < TW; j++) u[j][i] = t[i][j];
    store_tile(out, t, c, r, h); } }
