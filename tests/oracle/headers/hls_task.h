// A task runs once, at once, on what its streams already hold.
#pragma once
#include <utility>

#define hls_thread_local

namespace hls {
class task {
public:
    task() = default;
    template <class Function, class... Arguments>
    task(Function&& function, Arguments&&... arguments) { function(std::forward<Arguments>(arguments)...); }
    template <class Function, class... Arguments>
    void operator()(Function&& function, Arguments&&... arguments) { function(std::forward<Arguments>(arguments)...); }
};
}  // namespace hls
