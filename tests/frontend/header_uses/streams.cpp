typedef ap_axiu<512, 0, 0, 0> packet; typedef hls::axis<float, 1, 1, 1> sample;
void move(hls::stream<packet> &in, hls::stream<sample> &out, hls::stream<int> more[4], ap_uint<2> which) {
    packet p = in.read(); p.data.range(31, 0) = 3; p.keep = -1; do { in >> p; } while (!p.last);
    if (p.last == 1) in << p;
    sample s; s.data = 3.f; s.last = true; out << s; more[which].write(4); int i;
    if (more[0].read_nb(i) && !more[1].empty()) more[2].read(i);
}
void wrap() { hls::stream<int, 16> own("own"); hls::stream<int> &plain = own; plain.write(own.size()); }
