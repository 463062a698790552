// truth: run_cursor in[480] out[480]
class Cursor {
public:
    explicit Cursor(const int *start) : at(start) {}
    int next() { return *at++; }  //! read in sequential run=480

private:
    const int *at;
};
extern "C" void run_cursor(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    Cursor cursor(in);
    for (int i = 0; i < 480; i++) out[i] = cursor.next() * 2;  //! write out sequential run=480
}
