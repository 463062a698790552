#include "weigh.hpp"
template <class CFG> void run(typename CFG::in_t *in, typename CFG::out_t *out) {
    typename CFG::acc_t acc[CFG::n_out]; for (int i = 0; i < CFG::n_out; i++) { acc[i] = 0; for (int j = 0;
    j < CFG::n_in; j++) acc[i] += in[j] * CFG::weight(i, j); out[i] = acc[i]; } }
extern "C" void weigh(Cfg::in_t *a, Cfg::out_t *b) { run<Cfg>(a, b); }
