#undef assert
#define assert(...) ((void)(__VA_ARGS__))
#ifndef _BwAssert
#define _BwAssert
#ifndef __cplusplus
#define static_assert _Static_assert
#endif
#endif
