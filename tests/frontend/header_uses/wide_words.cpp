typedef ap_uint<512> word;
static const ap_uint<8> table[4] = {1, 2, 3, 4};
const ap_uint<4> grid[2][2] = {{1, 2}, {3, 4}};
enum mode { quiet, loud };
template <int W> ap_uint<W> turn(ap_uint<W> x, int by) { return (x << by) | (x >> (W - by)); }
void use(const word *in, word *out, volatile ap_uint<32> *port, float *echo, int i) {
    word w = in[0]; ap_uint<32> a = w.range(31, 0), b = w(63, 32); bool bit = w[3];
    w[4] = 1; w.range(7, 0) = a; w(15, 8) = 3; w[1] = a[2]; w.range(i * 8 + 7, i * 8) = b & 0xff;
    i = a; i += b; i = a * 4; i = a.to_int() + (int)b; float f = a; f = f * a; f += b; echo[a] = f;
    echo[a + 1] = echo[b];
    if (a == b && a > 3 && 4 <= b && !a || a[0]) i = 1; switch (a) { case 1: break; default: i = 2; }
    ap_uint<64> joined = (a, b); (a, b) = joined; joined = a.concat(b);
    a = (b.range(3, 0), b.range(31, 28), b[3], ap_uint<23>(0));
    mode m = loud; if (a == m) a = quiet; a = bit ? b : a; a = b ? 1 : 2; *port = a; a = *port; i = *port + 1;
    a ^= b; a |= b << 2; a = ~b; a++; --a; a = a % 7; a = turn(a, 3); a = turn<32>(a, 5); out[a] = in[b];
    *(out + a) = w;
    ap_uint<64> text("ff", 16); ap_uint<32> many[4] = {0}; many[0] += many[1] * 3 + i; a = b.get_bit(3) ? a : b;
    a.set_bit(1, true);
    for (ap_uint<9> k = 0; k < 16; k++) out[k] = in[k + 1]; std::swap(a, b); a = std::min(a, b); while (a) a >>= 1;
}
