#include "build.h"
#if NUM_CHANNELS > 2
#define EXTRA , float *c2
#else
#define EXTRA
#endif
#if defined(USE_DOUBLE) && USE_DOUBLE
typedef double T_;
#else
typedef float T_;
#endif
extern "C" void split(T_ *in, T_ *c0, T_ *c1 EXTRA) { for (int i = 0; i < COUNT; i++) {
    if (i % 2) c1[i / 2] = in[i]; else c0[i / 2] = in[i]; LOG("at %d", i); } }
