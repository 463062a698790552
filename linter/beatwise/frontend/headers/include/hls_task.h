#pragma once
#include <hls_stream.h>
#define hls_thread_local static
namespace hls {
struct task {
  task();
  template <class _BwF, class... _BwA> task(_BwF &&, _BwA &&...);
  template <class _BwF, class... _BwA> void operator()(_BwF &&, _BwA &&...);
};
}
