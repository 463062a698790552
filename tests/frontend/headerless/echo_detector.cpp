#include "Detector.h"
#include <cmath>
Detector::Detector(int n) : size(n), count(0) {}
void Detector::run(const float *in, float *out) { for (int i = 0; i < size; i++) { float v = in[i];
    if (v > threshold) { out[count++] = v; } } }
extern "C" void detect(const float *in, float *out, int n) { Detector d(n); d.run(in, out); for (int i = 0;
    i < n; i++) out[i] = std::sqrt(in[i]) * GAIN; }
