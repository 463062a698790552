#include "proto.h"
void fsm(cmd_t *cmds, resp_t *resps, int n) { state_e st = ST_IDLE; for (int i = 0; i < n; i++) {
    cmd_t c = cmds[i]; switch (c.op) { case OP_READ: st = ST_READ; break; case OP_WRITE: st = ST_WRITE;
    break; default: st = ST_IDLE; } resp_t r; r.status = (st == ST_READ) ? STATUS_OK : STATUS_ERR;
    r.data[0] = c.data[i % MAX_DATA]; resps[i] = r; } }
