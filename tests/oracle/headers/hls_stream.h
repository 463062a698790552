// An endless FIFO that runs on a computer.
#pragma once
#include <cstddef>
#include <cstdio>
#include <cstdlib>

namespace hls {

template <class Element, int DEPTH = 0>
class stream {
public:
    using element = Element;
    stream() = default;
    explicit stream(const char*) {}
    stream(const stream&) = delete;
    stream& operator=(const stream&) = delete;

    void write(const Element& value) {
        if (tail == room) grow();
        slots[tail++] = value;
    }
    Element read() {
        if (head == tail) {
            std::fputs("read from an empty stream\n", stderr);
            std::exit(5);
        }
        return slots[head++];
    }
    void read(Element& value) { value = read(); }
    bool read_nb(Element& value) {
        if (empty()) return false;
        value = read();
        return true;
    }
    bool write_nb(const Element& value) {
        write(value);
        return true;
    }
    void operator>>(Element& value) { value = read(); }
    void operator<<(const Element& value) { write(value); }
    bool empty() const { return head == tail; }
    bool full() const { return false; }
    std::size_t size() const { return tail - head; }

private:
    void grow() {
        std::size_t larger = room ? 2 * room : 64;
        auto* moved = new Element[larger];
        for (std::size_t i = 0; i < tail; ++i) moved[i] = slots[i];
        slots = moved;
        room = larger;
    }
    Element* slots = nullptr;
    std::size_t head = 0, tail = 0, room = 0;
};

}  // namespace hls
