typedef ap_fixed<16, 6, AP_RND, AP_SAT> number;
number filter(number x, number y, const number taps[3], float f) {
    number sum = 0; for (int i = 0; i < 3; i++) sum += taps[i] * x; sum = x / y; sum = 1 / x; sum = x * 3;
    f = f * x; f += x;
    ap_int<8> whole = x; sum = whole * x; sum.range(7, 0) = 3; whole = x(7, 0); int i = x; i = x.to_int();
    sum = x << 1;
    sum = hls::sqrt(x); sum = hls::max(x, y); f = hls::exp(f); f = std::sqrt(x);
    sum = (x > 0 && x < y) ? x : number(0); return -sum;
}
