#include "rain_tree.hpp"
using node_stream = hls::stream<Node>;
struct Walker { Node cur; uint16_t depth = 0; Walker() = default;
    bool step(const Node *nodes, feature_t const (&x)[NFEAT]) {
    if (cur.feature == Node::kLeaf) return false;
    cur = nodes[x[cur.feature] < cur.threshold ? cur.left : cur.right]; depth++; return true; } };
extern "C" void forest(const Node *nodes, const feature_t *rows, score_t *out, int n) { for (int r = 0;
    r < n; r++) { feature_t x[NFEAT]; for (int f = 0; f < NFEAT; f++) x[f] = rows[r * NFEAT + f];
    score_t s = 0; for (int t = 0; t < NTREES; t++) { Walker w; w.cur = nodes[t * NODES_PER_TREE];
    while (w.step(nodes, x)) { } s += w.cur.value; } out[r] = s / NTREES; } }
