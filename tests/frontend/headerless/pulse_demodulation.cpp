#include <iostream>
#include "receiver.hh"
void demod(cplx_t *iq, phase_t *phase, uint32_t n, mod_e mod) { for (uint32_t i = 0; i < n; ++i) {
    cplx_t s = iq[i]; switch (mod) { case mod_e::SIMPLE: { phase[2 * i] = s.real() * SQ2;
    phase[2 * i + 1] = s.imag() * SQ2; break; } case mod_e::COMPOUND: { phase[4 * i] = s.real();
    phase[4 * i + 2] = 2 - abs(s.real()); break; } default: DBG("bad mod " << i); } } }
