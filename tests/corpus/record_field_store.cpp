// truth: mark cells[128]
#include <cstdint>
struct Cell {
    uint64_t when;
    uint32_t kind;
    uint16_t station, sector;
};
void mark(Cell cells[128]) {
#pragma HLS INTERFACE m_axi port=cells bundle=gmem
    for (int i = 0; i < 128; i++) {
        cells[i].station = i & 7;  //! write cells sequential run=128 element=16 tells=partial-record
    }
}
