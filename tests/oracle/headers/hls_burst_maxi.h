// Explicit burst requests: the request is what is observed, the data follows quietly.
#pragma once
#include <cstddef>

void oracle_request(const void* start, std::size_t bytes, bool store);

namespace hls {

template <class Element>
class burst_maxi {
public:
    using element = Element;
    burst_maxi(Element* base) : base(base) {}
    void read_request(std::size_t offset, std::size_t count) {
        reading = base + offset;
        oracle_request(reading, count * sizeof(Element), false);
    }
    __attribute__((no_sanitize("thread"))) Element read() { return *reading++; }
    void write_request(std::size_t offset, std::size_t count) {
        writing = base + offset;
        oracle_request(writing, count * sizeof(Element), true);
    }
    __attribute__((no_sanitize("thread"))) void write(const Element& value) { *writing++ = value; }
    void write_response() {}

private:
    Element *base, *reading = nullptr, *writing = nullptr;
};

}  // namespace hls
