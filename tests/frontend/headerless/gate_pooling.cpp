#include "station_types.h"
#include <hls_stream.h>
template <typename Echo, int ROWS, int COLS, int KS>
class Pooler {
public:
  Pooler() : row(0) {}
  void step(hls::stream<Echo> &in, hls::stream<Echo> &out) {
    for (int c = 0; c < COLS; ++c) { Echo p = in.read();
        buf[c] = mode == POOL_MAX ? maxOf(buf[c], p) : Echo(buf[c] + p); }
    if (++row == KS) { for (int c = 0; c < COLS; c += KS) out.write(buf[c]); row = 0; }
  }
private:
  Echo buf[COLS]; int row; PoolMode mode;
};
extern "C" void pool_sweeps(const echo_t *in, echo_t *out, int sweeps) {
  static Pooler<echo_t, SWEEP_RAYS, SWEEP_GATES, 2> p; hls::stream<echo_t> a, b;
  for (int f = 0; f < sweeps; f++) { for (int i = 0; i < SWEEP_RAYS * SWEEP_GATES;
      i++) a.write(in[f * SWEEP_RAYS * SWEEP_GATES + i]); p.step(a, b); out[f] = b.read(); }
}
