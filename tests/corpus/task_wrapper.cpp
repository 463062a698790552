// truth: feed n=64 in[64] out[64]
#include <hls_stream.h>
#include <hls_task.h>
static void reader(int n, const int *in, hls::stream<int> &s) {
    for (int i = 0; i < n; i++) s.write(in[i]);  //! read in sequential run=64
}
static void writer(int n, hls::stream<int> &s, int *out) {
    for (int i = 0; i < n; i++) out[i] = s.read();  //! write out sequential run=64
}
extern "C" void feed(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    hls_thread_local hls::stream<int> s;
    hls_thread_local hls::task first(reader, n, in, s);
    hls_thread_local hls::task second(writer, n, s, out);
}
