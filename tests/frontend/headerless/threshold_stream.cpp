#include "station_stream.hpp"
typedef ap_axiu<DATA_W, 1, 1, 1> axis_t; typedef hls::stream<axis_t> axis_stream;
void thresh(axis_stream &src, axis_stream &dst, station_registers &regs, ap_uint<1> &irq) {
    bool eol = false; axis_t px; ROW: for (ap_uint<12> y = 0; y < regs.height; y++) { do { src >> px; }
    while (!px.user.to_bool() && y == 0); COL: for (ap_uint<12> x = 0; x < regs.width; x++) {
    if (x) src >> px; for (int c = 0; c < PPC; c++) {
    ap_uint<BPP> v = px.data.range((c + 1) * BPP - 1, c * BPP);
    px.data.range((c + 1) * BPP - 1, c * BPP) = (v > regs.level) ? ap_uint<BPP>(-1) : ap_uint<BPP>(0); }
    px.last = x == regs.width - 1; dst << px; } } irq = 1; }
