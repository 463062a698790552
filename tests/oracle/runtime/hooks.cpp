// The other side of -fsanitize=thread: instead of looking for races, these hooks write down every load, store and copy
// that falls into a watched buffer, together with the place in the user's code that asked for it.
#include "hooks.h"

#include <cstdio>
#include <cstdlib>
#include <map>
#include <utility>
#include <vector>

namespace {

struct Buffer {
    uintptr_t start, end;
    std::vector<unsigned char> before;  // what it held when recording began
    std::vector<bool> stored;
};

struct Event {          // as read by oracle/observe.py
    uint32_t pc;        // return address of the hook's caller, or of the call out of the user's code
    uint32_t node;      // call path of user code, an index into the call tree
    uint32_t instance;  // the call into a header that this belongs to; 0 where the user's own code accesses memory
    uint16_t buffer;
    uint16_t kind;      // bit 0: store, bit 1: copy or request (a range that is a run by itself)
    uint64_t offset;
    uint64_t bytes;
};

struct Frame {
    uint32_t node, user_pc, instance;
};

constexpr size_t MAX_EVENTS = 4'000'000;

std::vector<Buffer> buffers;
std::vector<std::pair<uintptr_t, uintptr_t>> user_code;  // sorted, half open
std::vector<Event> events;
std::vector<Frame> stack{{0, 0, 0}};
std::vector<std::pair<uint32_t, uint32_t>> tree{{0, 0}};  // node -> (parent, pc)
std::map<std::pair<uint32_t, uint32_t>, uint32_t> children;
uint32_t instances = 0;
bool recording = false;

bool is_user(uintptr_t pc) {
    size_t low = 0, high = user_code.size();
    while (low < high) {
        size_t middle = (low + high) / 2;
        if (user_code[middle].second <= pc) low = middle + 1;
        else high = middle;
    }
    return low < user_code.size() && user_code[low].first <= pc;
}

[[noreturn]] void fail(const char* why) {
    std::fprintf(stderr, "%s\n", why);
    std::exit(3);
}

void record(const void* address, uint64_t bytes, uint16_t kind, void* from) {
    if (!recording || bytes == 0) return;
    auto at = reinterpret_cast<uintptr_t>(address);
    for (size_t i = 0; i < buffers.size(); ++i) {
        if (at < buffers[i].start || at >= buffers[i].end) continue;
        if (kind & 1) {
            for (uint64_t byte = 0; byte < bytes && at + byte < buffers[i].end; ++byte) buffers[i].stored[at + byte - buffers[i].start] = true;
        }
        if (events.size() == MAX_EVENTS) fail("too many accesses");
        const Frame& frame = stack.back();
        auto pc = reinterpret_cast<uintptr_t>(from);
        bool own = frame.instance == 0 && is_user(pc - 1);
        events.push_back({own ? static_cast<uint32_t>(pc) : frame.user_pc, frame.node, own ? 0 : frame.instance,
                          static_cast<uint16_t>(i), kind, at - buffers[i].start, bytes});
        return;
    }
}

}  // namespace

void oracle_watch(const void* start, size_t bytes) {
    auto at = reinterpret_cast<uintptr_t>(start);
    buffers.push_back({at, at + bytes, {}, std::vector<bool>(bytes)});
}

void oracle_start(const char* user_code_file) {
    FILE* file = std::fopen(user_code_file, "r");
    unsigned long low, high;
    while (file && std::fscanf(file, "%lx %lx", &low, &high) == 2) user_code.push_back({low, high});
    if (!file) fail("no table of user code");
    std::fclose(file);
    for (Buffer& buffer : buffers) {
        auto* memory = reinterpret_cast<unsigned char*>(buffer.start);
        buffer.before.assign(memory, memory + (buffer.end - buffer.start));
    }
    recording = true;
}

void oracle_finish(const char* event_file) {
    recording = false;
    FILE* file = std::fopen(event_file, "wb");
    if (!file) fail("the events can't be written");
    for (const Buffer& buffer : buffers) {
        for (size_t i = 0; i < buffer.before.size(); ++i) {
            if (!buffer.stored[i] && reinterpret_cast<unsigned char*>(buffer.start)[i] != buffer.before[i])
                fail("a store was not seen: the compiler does not instrument `a[i] = f()` for a plain record; store a variable");
        }
    }
    uint32_t nodes = static_cast<uint32_t>(tree.size());
    std::fwrite(&nodes, sizeof nodes, 1, file);
    std::fwrite(tree.data(), sizeof tree[0], tree.size(), file);
    std::fwrite(events.data(), sizeof events[0], events.size(), file);
    std::fclose(file);
}

void oracle_request(const void* start, size_t bytes, bool store) {
    record(start, bytes, store ? 3 : 2, __builtin_return_address(0));
}

extern "C" {

void __tsan_init() {}
void __tsan_vptr_update(void*, void*) {}
void __tsan_vptr_read(void*) {}

void __tsan_func_entry(void* caller) {
    Frame frame = stack.back();
    auto from = reinterpret_cast<uintptr_t>(caller);
    bool from_user = frame.instance == 0 && is_user(from - 1);
    if (is_user(reinterpret_cast<uintptr_t>(__builtin_return_address(0)))) {
        uint32_t site = from_user ? static_cast<uint32_t>(from) : frame.user_pc;
        if (site != 0) {  // a call path grows where user code calls user code, through a header or not
            auto [entry, fresh] = children.try_emplace({frame.node, site}, static_cast<uint32_t>(tree.size()));
            if (fresh) tree.push_back({frame.node, site});
            frame.node = entry->second;
        }
        frame.instance = 0;
        frame.user_pc = 0;
    } else if (from_user) {
        frame.instance = ++instances;
        frame.user_pc = static_cast<uint32_t>(from);
    }
    stack.push_back(frame);
}

void __tsan_func_exit() {
    if (stack.size() > 1) stack.pop_back();
}

#define ORACLE_SIZE(n)                                                                                    \
    void __tsan_read##n(void* at) { record(at, n, 0, __builtin_return_address(0)); }                      \
    void __tsan_write##n(void* at) { record(at, n, 1, __builtin_return_address(0)); }                     \
    void __tsan_unaligned_read##n(void* at) { record(at, n, 0, __builtin_return_address(0)); }            \
    void __tsan_unaligned_write##n(void* at) { record(at, n, 1, __builtin_return_address(0)); }           \
    void __tsan_volatile_read##n(void* at) { record(at, n, 0, __builtin_return_address(0)); }             \
    void __tsan_volatile_write##n(void* at) { record(at, n, 1, __builtin_return_address(0)); }
ORACLE_SIZE(1)
ORACLE_SIZE(2)
ORACLE_SIZE(4)
ORACLE_SIZE(8)
ORACLE_SIZE(16)

void __tsan_read_range(void* at, size_t bytes) { record(at, bytes, 0, __builtin_return_address(0)); }
void __tsan_write_range(void* at, size_t bytes) { record(at, bytes, 1, __builtin_return_address(0)); }

void* __wrap_memmove(void* to, const void* from, size_t bytes) {
    record(from, bytes, 2, __builtin_return_address(0));
    record(to, bytes, 3, __builtin_return_address(0));
    auto* target = static_cast<char*>(to);
    auto* origin = static_cast<const char*>(from);
    if (target < origin) for (size_t i = 0; i < bytes; ++i) target[i] = origin[i];
    else for (size_t i = bytes; i-- > 0;) target[i] = origin[i];
    return to;
}

void* __wrap_memcpy(void* to, const void* from, size_t bytes) {
    record(from, bytes, 2, __builtin_return_address(0));
    record(to, bytes, 3, __builtin_return_address(0));
    auto* target = static_cast<char*>(to);
    auto* origin = static_cast<const char*>(from);
    for (size_t i = 0; i < bytes; ++i) target[i] = origin[i];
    return to;
}

void* __wrap_memset(void* to, int value, size_t bytes) {
    record(to, bytes, 3, __builtin_return_address(0));
    auto* target = static_cast<char*>(to);
    for (size_t i = 0; i < bytes; ++i) target[i] = static_cast<char>(value);
    return to;
}
}
