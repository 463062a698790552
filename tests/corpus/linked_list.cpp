// truth: walk steps=200 nodes[256]=cycle sum[1]
struct Node {
    int next;
    int value;
};
extern "C" void walk(int steps, const Node *nodes, int *sum) {
#pragma HLS INTERFACE m_axi port=nodes bundle=gmem0
#pragma HLS INTERFACE m_axi port=sum bundle=gmem1
    int at = 3, s = 0;
    for (int i = 0; i < steps; i++) {
        s += nodes[at].value;  //! read nodes indirect run=1 tells=indirect-index
        at = nodes[at].next & 255;  //! read nodes indirect run=1
    }
    *sum = s;  //! write sum single
}
