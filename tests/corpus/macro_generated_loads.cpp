// truth: load_all a[64] b[64] c[64] sum[64]
#define PRAGMA(text) _Pragma(#text)
#define PORT(name) PRAGMA(HLS INTERFACE m_axi port=name bundle=name)
#define LOAD(name, n)                                     \
    int local_##name[n];                                  \
    for (int i_##name = 0; i_##name < (n); ++i_##name) {  \
        local_##name[i_##name] = name[i_##name];          \
    }
extern "C" void load_all(const int *a, const int *b, const int *c, int *sum) {
    PORT(a)
    PORT(b)
    PORT(c)
    PORT(sum)
    LOAD(a, 64)  //! read a sequential run=64
    LOAD(b, 64)  //! read b sequential run=64
    LOAD(c, 64)  //! read c sequential run=64
    for (int i = 0; i < 64; i++) sum[i] = local_a[i] + local_b[i] + local_c[i];  //! write sum sequential run=64
}
