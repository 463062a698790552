// truth: by_sector az[400]=0..3 dbz[400] north[400] east[400] south[400] west[400]
#include <stdint.h>
void by_sector(const uint8_t *az, const float *dbz, float *north, float *east, float *south, float *west) {
#pragma HLS INTERFACE m_axi port=az bundle=m0
#pragma HLS INTERFACE m_axi port=dbz bundle=m1
#pragma HLS INTERFACE m_axi port=north bundle=m2
#pragma HLS INTERFACE m_axi port=east bundle=m3
#pragma HLS INTERFACE m_axi port=south bundle=m4
#pragma HLS INTERFACE m_axi port=west bundle=m5
    for (int i = 0; i < 400; i++) {
        float value = dbz[i];  //! read dbz sequential run=400
        switch (az[i]) {  //! read az sequential run=400
        case 0: north[i] = value; break;  //! write north steered tells=data-dependent-destination
        case 1: east[i] = value; break;  //! write east steered
        case 2: south[i] = value; break;  //! write south steered
        default: west[i] = value;  //! write west steered
        }
    }
}
