half mix(half a, half b, float f) { a = a * b + a; a += 1; a = 1.5; a = a * 2.0f; f = a; f = a * f;
if (a > b || a == 0 || a < 0.5f) a = -a; return hls::sqrt(a); }
