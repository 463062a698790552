typedef hls::vector<float, 16> v16;
void add(const v16 *a, v16 *b, int n) { for (int i = 0; i < n; i++) { v16 v = a[i]; v = v + b[i] * 2; v *= 2.f;
v[3] = v.reduce_add(); b[i] = v; b[i] = 0.f; } }
