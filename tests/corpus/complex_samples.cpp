// truth: multiply n=256 a[256] b[256] out[256]
struct Complex {
    float re, im;
    Complex operator*(const Complex &o) const { return {re * o.re - im * o.im, re * o.im + im * o.re}; }
};
extern "C" void multiply(int n, const Complex *a, const Complex *b, Complex *out) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int i = 0; i < n; i++) {
        Complex x = a[i];  //! read a sequential run=256 element=8
        Complex y = b[i];  //! read b sequential run=256 element=8
        Complex p = x * y;
        out[i] = p;  //! write out sequential run=256 element=8
    }
}
