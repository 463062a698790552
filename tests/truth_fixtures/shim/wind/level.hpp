#pragma once
namespace wind {
struct level_t {
    float height, drift;
};
inline level_t height(int level) { return {100.0f * level, 0.5f}; }
}  // namespace wind
