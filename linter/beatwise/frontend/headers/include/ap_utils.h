#pragma once
#include <ap_int.h>
void ap_wait();
void ap_wait_n(int);
void ap_wait_until(bool);
template <class... _BwT> void ap_fence(_BwT &&...);
template <class _BwT> _BwT reg(const _BwT &);
