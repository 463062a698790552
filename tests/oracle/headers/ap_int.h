// Integers of any width that run on a computer: enough of them for kernels under observation.
// Up to 64 bits one lies in the built-in integer of the next power of two; wider ones are 64-bit words, their number
// a power of two. Copies are functions, because the compiler does not instrument a bare copy from or to a call.
#pragma once
#include <cstdint>
#include <type_traits>

template <int BITS> struct ap_uint;
template <int BITS> struct ap_int;

namespace ap_oracle {

constexpr int power_of_two(int n) { return n <= 1 ? 1 : 2 * power_of_two((n + 1) / 2); }

template <int BITS, bool SIGNED>
using small_storage = std::conditional_t<
    BITS <= 8, std::conditional_t<SIGNED, int8_t, uint8_t>,
    std::conditional_t<BITS <= 16, std::conditional_t<SIGNED, int16_t, uint16_t>,
                       std::conditional_t<BITS <= 32, std::conditional_t<SIGNED, int32_t, uint32_t>,
                                          std::conditional_t<SIGNED, int64_t, uint64_t>>>>;

// Setting a few bits is a store; that the rest of the word must be known for it is nobody's load.
template <class Word>
__attribute__((no_sanitize("thread"))) Word unseen(const Word& word) { return word; }

// A slice of an integer, to be read or assigned.
template <class Whole>
struct slice {
    Whole& whole;
    int high, low;
    uint64_t word(int from) const {  // up to 64 bits, ``from`` bits above ``low``
        uint64_t value = 0;
        for (int i = 0; i < 64 && low + from + i <= high; ++i) value |= uint64_t(whole.bit_at(low + from + i)) << i;
        return value;
    }
    operator uint64_t() const { return word(0); }
    int to_int() const { return int(word(0)); }
    unsigned to_uint() const { return unsigned(word(0)); }
    uint64_t to_uint64() const { return word(0); }
    template <class Value>
    slice& operator=(const Value& value) {
        if constexpr (std::is_arithmetic_v<Value>) {
            for (int i = 0; low + i <= high; ++i) whole.set_at(low + i, i < 64 && (uint64_t(int64_t(value)) >> i & 1));
        } else {
            for (int i = 0; low + i <= high; ++i) whole.set_at(low + i, value.bit_at(i));
        }
        return *this;
    }
    slice& operator=(const slice& other) { return operator=<slice>(other); }
    bool bit_at(int i) const { return low + i <= high && whole.bit_at(low + i); }
};

template <class Self, int BITS>
struct slices {
    slice<Self> range(int high, int low) { return {self(), high, low}; }
    slice<const Self> range(int high, int low) const { return {self(), high, low}; }
    slice<Self> operator()(int high, int low) { return {self(), high, low}; }
    slice<const Self> operator()(int high, int low) const { return {self(), high, low}; }
    slice<Self> operator[](int i) { return {self(), i, i}; }
    bool operator[](int i) const { return self().bit_at(i); }
    bool test(int i) const { return self().bit_at(i); }
    bool get_bit(int i) const { return self().bit_at(i); }
    void set_bit(int i, bool value) { self().set_at(i, value); }
    static constexpr int length() { return BITS; }
    static constexpr int width = BITS;

private:
    Self& self() { return static_cast<Self&>(*this); }
    const Self& self() const { return static_cast<const Self&>(*this); }
};

template <class Self, int BITS, bool SIGNED>
struct small : slices<Self, BITS> {
    using slices<Self, BITS>::operator[];
    using storage = small_storage<BITS, SIGNED>;
    storage value;
    small() = default;
    small(const small& other) : value(other.value) {}
    small& operator=(const small& other) {
        value = other.value;
        return *this;
    }
    template <class Number, class = std::enable_if_t<std::is_arithmetic_v<Number>>>
    small(Number number) : value(narrow(uint64_t(int64_t(number)))) {}
    static storage narrow(uint64_t wide) {
        if constexpr (BITS == 64) return storage(wide);
        uint64_t kept = wide & ((uint64_t(1) << (BITS % 64)) - 1);
        if (SIGNED && (kept >> (BITS - 1) & 1)) kept |= ~uint64_t(0) << (BITS % 64);
        return storage(kept);
    }
    using number = std::conditional_t<SIGNED || BITS < 64, long long, unsigned long long>;
    operator number() const { return number(value); }
    bool bit_at(int i) const { return uint64_t(int64_t(value)) >> (i < BITS ? i : BITS - 1) & (i < BITS || SIGNED); }
    void set_at(int i, bool on) {
        uint64_t bit = uint64_t(1) << i;
        value = narrow(on ? uint64_t(unseen(value)) | bit : uint64_t(unseen(value)) & ~bit);
    }
    int to_int() const { return int(value); }
    unsigned to_uint() const { return unsigned(value); }
    int64_t to_int64() const { return int64_t(value); }
    uint64_t to_uint64() const { return uint64_t(value); }
    Self& operator++() { return put(uint64_t(value) + 1); }
    Self& operator--() { return put(uint64_t(value) - 1); }
    Self operator++(int) {
        Self before{number(value)};
        ++*this;
        return before;
    }
    Self operator--(int) {
        Self before{number(value)};
        --*this;
        return before;
    }
#define AP_ORACLE_ASSIGN(op)                            \
    template <class Other>                              \
    Self& operator op##=(const Other& other) {          \
        return put(uint64_t(number(value) op other));   \
    }
    AP_ORACLE_ASSIGN(+)
    AP_ORACLE_ASSIGN(-)
    AP_ORACLE_ASSIGN(*)
    AP_ORACLE_ASSIGN(/)
    AP_ORACLE_ASSIGN(%)
    AP_ORACLE_ASSIGN(&)
    AP_ORACLE_ASSIGN(|)
    AP_ORACLE_ASSIGN(^)
    AP_ORACLE_ASSIGN(<<)
    AP_ORACLE_ASSIGN(>>)
#undef AP_ORACLE_ASSIGN
private:
    Self& put(uint64_t wide) {
        value = narrow(wide);
        return static_cast<Self&>(*this);
    }
};

template <class Self, int BITS>
struct wide : slices<Self, BITS> {
    static constexpr int WORDS = power_of_two((BITS + 63) / 64);
    uint64_t words[WORDS];
    wide() = default;
    wide(const wide& other) { *this = other; }
    wide& operator=(const wide& other) {
        for (int i = 0; i < WORDS; ++i) words[i] = other.words[i];
        return *this;
    }
    bool bit_at(int i) const { return i < BITS && (words[i / 64] >> (i % 64) & 1); }
    void set_at(int i, bool on) {
        uint64_t bit = uint64_t(1) << (i % 64);
        uint64_t word = unseen(words[i / 64]);
        words[i / 64] = on ? word | bit : word & ~bit;
    }
    int to_int() const { return int(words[0]); }
    uint64_t to_uint64() const { return words[0]; }
    bool operator==(const wide& other) const {
        for (int i = 0; i < WORDS; ++i)
            if (words[i] != other.words[i]) return false;
        return true;
    }
    bool operator!=(const wide& other) const { return !(*this == other); }
#define AP_ORACLE_BITWISE(op)                                                        \
    friend Self operator op(const Self& left, const Self& right) {                   \
        Self result = left;                                                          \
        for (int i = 0; i < WORDS; ++i) result.words[i] op##= right.words[i];        \
        return result;                                                               \
    }                                                                                \
    Self& operator op##=(const Self& other) {                                        \
        for (int i = 0; i < WORDS; ++i) words[i] op##= other.words[i];               \
        return static_cast<Self&>(*this);                                            \
    }
    AP_ORACLE_BITWISE(&)
    AP_ORACLE_BITWISE(|)
    AP_ORACLE_BITWISE(^)
#undef AP_ORACLE_BITWISE
    friend Self operator+(const Self& left, const Self& right) {
        Self result = left;
        uint64_t carry = 0;
        for (int i = 0; i < WORDS; ++i) {
            unsigned __int128 sum = (unsigned __int128)left.words[i] + right.words[i] + carry;
            result.words[i] = uint64_t(sum);
            carry = uint64_t(sum >> 64);
        }
        return result;
    }
    friend Self operator<<(const Self& left, int by) {
        Self result = 0;
        for (int i = by; i < BITS; ++i) result.set_at(i, left.bit_at(i - by));
        return result;
    }
    friend Self operator>>(const Self& left, int by) {
        Self result = 0;
        for (int i = 0; i + by < BITS; ++i) result.set_at(i, left.bit_at(i + by));
        return result;
    }
    Self& operator<<=(int by) { return static_cast<Self&>(*this) = static_cast<Self&>(*this) << by; }
    Self& operator>>=(int by) { return static_cast<Self&>(*this) = static_cast<Self&>(*this) >> by; }

protected:
    void fill(uint64_t low, uint64_t rest) {
        words[0] = low;
        for (int i = 1; i < WORDS; ++i) words[i] = rest;
    }
};

template <class Self, int BITS, bool SIGNED>
using base = std::conditional_t<(BITS <= 64), small<Self, BITS, SIGNED>, wide<Self, BITS>>;

}  // namespace ap_oracle

#define AP_ORACLE_TYPE(NAME, SIGNED)                                                                               \
    template <int BITS>                                                                                            \
    struct NAME : ap_oracle::base<NAME<BITS>, BITS, SIGNED> {                                                      \
        NAME() = default;                                                                                          \
        template <class Number, class = std::enable_if_t<std::is_arithmetic_v<Number>>>                            \
        NAME(Number number) {                                                                                      \
            if constexpr (BITS <= 64) this->value = this->narrow(uint64_t(int64_t(number)));                       \
            else this->fill(uint64_t(int64_t(number)), std::is_signed_v<Number> && number < 0 ? ~uint64_t(0) : 0); \
        }                                                                                                          \
        template <int OTHER> NAME(const ap_uint<OTHER>& other) { copy(other); }                                    \
        template <int OTHER> NAME(const ap_int<OTHER>& other) { copy(other); }                                     \
        template <class Whole> NAME(const ap_oracle::slice<Whole>& other) { copy(other); }                         \
                                                                                                                   \
    private:                                                                                                       \
        template <class Other> void copy(const Other& other) {                                                     \
            *this = NAME(0);                                                                                       \
            for (int i = 0; i < BITS; ++i) this->set_at(i, other.bit_at(i));                                       \
        }                                                                                                          \
    };
AP_ORACLE_TYPE(ap_uint, false)
AP_ORACLE_TYPE(ap_int, true)
#undef AP_ORACLE_TYPE
