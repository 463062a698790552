typedef int block[16];
void work(hls::stream<int> &a, hls::stream<int> &b) { b.write(a.read()); }
template <int K> void scale(hls::stream<int> &a, hls::stream<int> &b) { b.write(a.read() * K); }
void fill(hls::stream_of_blocks<block> &s) { hls::write_lock<block> l(s); for (int i = 0; i < 16; i++) l[i] = i;
hls::read_lock<block> r(s); int z = r[3]; }
void top(hls::burst_maxi<ap_uint<256>> m, hls::stream<int> &in, hls::stream<int> &out) {
    m.read_request(0, 16); ap_uint<256> w = m.read(); m.write_request(4, 1); m.write(w); m.write_response();
    hls_thread_local hls::stream<int> a; hls_thread_local hls::split::round_robin<int, 4> deal;
    hls_thread_local hls::task first(work, in, a); hls_thread_local hls::task second(scale<3>, a, deal.in);
    hls_thread_local hls::task many[4];
    for (int i = 0; i < 4; i++) many[i](work, deal.out[i], out);
    hls::stream_of_blocks<block, 4> blocks; fill(blocks);
}
