using V = tapa::vec_t<float, 16>;
void load(tapa::mmap<const V> m, int n, tapa::ostream<V> &o) { [[tapa::pipeline(1)]] for (int i = 0; i < n;
i++) o << m[i]; o.close(); }
void fetch(tapa::async_mmap<V> &m, tapa::ostream<V> &o) { for (int a = 0, b = 0; b < 10;) {
if (a < 10 && m.read_addr.try_write(a)) a++; V v; if (m.read_data.try_read(v)) { o.write(v); b++; } } }
void work(tapa::istream<V> &a, tapa::ostreams<V, 4> &o) { TAPA_WHILE_NOT_EOT(a) { V v = a.read(nullptr); v = v + v;
v[3] = 1; for (int c = 0; c < 4; c++) o[c].write(v); } }
void store(tapa::istream<V> &i, tapa::mmap<V> m, int n) { for (int k = 0; k < n; k++) m[k] = i.read(); }
void top(tapa::mmap<V> a, tapa::mmaps<V, 4> b, uint64_t n) {
    tapa::stream<V, 4> s("s"); tapa::streams<V, 4, 8> q("q");
    tapa::task().invoke(load, a, n, s).invoke(work, "work", s, q).invoke<tapa::join, 4>(store, q, b, n).invoke<tapa::detach>(fetch, a, s);
}
