#pragma once
namespace hls {
template <class... _BwT> void print(const char *, const _BwT &...);
}
