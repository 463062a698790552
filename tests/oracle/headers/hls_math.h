#pragma once
#include <cmath>

namespace hls {
using std::abs, std::ceil, std::cos, std::exp, std::fabs, std::floor, std::log, std::log10, std::pow, std::round, std::sin, std::sqrt;
}
