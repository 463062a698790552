"""Functions: templates, methods, lambdas and whatever else is called, each with the body that is meant."""

from __future__ import annotations

from beatwise.frontend.mentions import nodes
from beatwise.model.kernel import Call, Declare, FunctionName, Index
from helpers.lowered import function_named, lines, program, shown


def test_each_instantiation_is_a_function_of_its_own() -> None:
    text = """
        template <int N, typename T> void clear(T *a) { for (int i = 0; i < N; i++) a[i] = N; }
        extern "C" void echo(int *a, float *f) { clear<4>(a); clear<8>(f); clear<4>(a); }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32, f: *r32) -> void
          clear(a)
          clear(f)
          clear(a)
        clear(a: *i32) -> void
          let i: i32 = 0
          loop i < 4 step i++
            a[i] = 4
        clear(a: *r32) -> void
          let i: i32 = 0
          loop i < 8 step i++
            a[i] = 8.0""")


def test_templates_reach_three_deep() -> None:
    text = """
        template <typename T, int N> struct tile {
          template <int M> struct row { static void put(T *p, int i) { p[i * N + M] = T(M); } };
          template <int M> void all(T *p) { for (int i = 0; i < N; i++) row<M>::put(p, i); }
        };
        template <int D> void tree(int *a) { if constexpr (D > 1) tree<D / 2>(a + D); else tile<int, 5>().all<3>(a); }
        extern "C" void echo(int *a) { tree<2>(a); }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32) -> void
          tree(a)
        tree(a: *i32) -> void
          if 2 > 1
            tree(a + 2)
          else
        tree(a: *i32) -> void
          if 1 > 1
          else
            {}.all(a)
        all(p: *i32) -> void
          let i: i32 = 0
          loop i < 5 step i++
            put(p, i)
        put(p: *i32, i: i32) -> void
          p[(i * 5) + 3] = 3""")


def test_methods_work_on_their_object() -> None:
    text = """
        struct base { int *mem; base(int *m) : mem(m) {} int at(int i) const { return mem[i]; } };
        struct reader : base {
          int step = 2;
          static const int LIMIT = 64;
          static int count;
          reader(int *m) : base(m) {}
          int get(int i, int by = 3) { count++; return at(i * step) + by; }
          int &operator[](int i) { return this->mem[i + LIMIT]; }
        };
        int reader::count = 0;
        extern "C" void echo(int *a) { reader r(a), *p = &r; r[1] = r.get(2) + p->get(4, 5); }
    """
    assert shown(text) == lines("""
        global count: i32 = 0
        top extern-c echo(a: *i32) -> void
          let r: reader = new reader(a)
          let p: *reader = &r
          r.operator[](1) = (r.get(2, 3) + *p.get(4, 5))
        reader(m: *i32) -> void : step=2, base=new base(m)
        operator[](i: i32) -> &i32
          return *<*base>this.mem[i + 64]
        get(i: i32, by: i32) -> i32
          count++
          return *this.at(i * *this.step) + by
        base(m: *i32) -> void : mem=m
        at(i: i32) -> i32
          return *this.mem[i]""")


def test_a_variable_without_a_constructor_of_the_user_starts_open() -> None:
    text = """
        struct plain { int a, b; };
        struct preset { int a = 4; };
        extern "C" void echo(int *a) { plain p; plain q{}; preset r; a[0] = p.a + q.b + r.a; }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32) -> void
          let p: plain
          let q: plain = {}
          let r: preset = new preset()
          a[0] = ((p.a + q.b) + r.a)
        preset() -> void : a=4""")


def test_a_lambda_is_a_value_with_captures() -> None:
    text = """
        extern "C" void echo(int *a, int n) {
          int k = 2;
          auto put = [&, k](int i) { a[i] = k + n; };
          put(3);
          auto step = [p = a + 4](int i) { return p[i]; };
          a[0] = step(1);
        }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32, n: i32) -> void
          let k: i32 = 2
          let put: callable = function operator()[k, &a, &n]
          put!(3)
          let p: *i32 = a + 4
          let step: callable = function operator()[p]
          a[0] = step!(1)
        operator()(i: i32) -> void
          a[i] = (k + n)
        operator()(i: i32) -> i32
          return p[i]""")


def test_the_lambda_in_a_variable_is_a_function_of_the_program() -> None:
    read = program('extern "C" void echo(int *a) { auto put = [=](int i) { a[i] = 0; }; put(3); }')
    echo = function_named(read, "echo")
    assert echo.body
    declared = echo.body.body[0]
    assert isinstance(declared, Declare)
    value = declared.variable.initial
    assert isinstance(value, FunctionName)
    assert read.functions[value.key].name == "operator()"
    assert value.captures == ((echo.parameters[0].key, False),)


def test_a_generic_lambda_tells_its_instance_at_the_call() -> None:
    text = 'extern "C" void echo(int *a) { auto put = [=](auto v) { a[0] = v; }; put(3); put(4.0f); }'
    read = program(text)
    echo = function_named(read, "echo")
    assert echo.body
    calls = [one.expression for one in echo.body.body[1:]]  # type: ignore[union-attr]
    keys = [one.function for one in calls if isinstance(one, Call)]
    assert len(set(keys)) == 2
    assert all(key in read.functions for key in keys)


def test_functions_are_values_too() -> None:
    text = """
        float twice(float x) { return 2 * x; }
        struct scale { float k; float operator()(float x) const { return k * x; } };
        template <class F> void each(float *a, F f) { a[0] = f(a[1]); }
        extern "C" void echo(float *a, int n) {
          float (*f)(float) = twice;
          a[2] = f(a[3]) + (*f)(a[4]);
          float (*table[2])(float) = {twice, &twice};
          a[5] = table[n](a[6]);
          each(a, twice);
          each(a, scale{3});
        }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *r32, n: i32) -> void
          let f: callable = function twice
          a[2] = (f!(a[3]) + f!(a[4]))
          let table: callable[2] = {function twice, function twice}
          a[5] = table[n]!(a[6])
          each(a, function twice)
          each(a, {3.0})
        twice(x: r32) -> r32
          return 2.0 * x
        each(a: *r32, f: callable) -> void
          a[0] = f!(a[1])
        each(a: *r32, f: scale) -> void
          a[0] = f.operator()(a[1])
        operator()(x: r32) -> r32
          return *this.k * x""")


def test_wrappers_of_tasks_and_threads_name_the_function_they_run() -> None:
    text = """
        #include <hls_task.h>
        #include <hls_stream.h>
        #include <thread>
        template <int K> void work(hls::stream<int> &in, hls::stream<int> &out) { out.write(in.read() * K); }
        struct unit { void run(int *a) { a[0] = 1; } };
        extern "C" void echo(int *a, hls::stream<int> &in, hls::stream<int> &out) {
          hls::task one(work<3>, in, out);
          unit u;
          std::thread two(&unit::run, &u, a);
        }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32, in: &stream<i32>, out: &stream<i32>) -> void
          let one: task = new task?(function work, in, out)
          let u: unit
          let two: thread = new thread?(function run, &u, a)
        work(in: &stream<i32>, out: &stream<i32>) -> void
          out.write?(in.read?() * 3)
        run(a: *i32) -> void
          a[0] = 1""")


def test_overloads_and_operators_of_the_user_are_the_ones_the_compiler_chose() -> None:
    text = """
        struct pair { int a, b; };
        pair operator+(const pair &l, const pair &r) { return {l.a + r.a, l.b + r.b}; }
        int first(int *p) { return p[0]; }
        float first(float *p) { return p[1]; }
        extern "C" void echo(int *a, float *f, pair *p) { p[0] = p[1] + p[2]; a[0] = first(a); f[0] = first(f); }
    """
    assert (
        shown(text).splitlines()[:4]
        == lines("""
        top extern-c echo(a: *i32, f: *r32, p: *pair) -> void
          p[0] = operator+(p[1], p[2])
          a[0] = first(a)
          f[0] = first(f)""").splitlines()
    )
    assert [one.result.bytes for one in program(text).functions.values() if one.name == "first"] == [4, 4]


def test_an_expression_as_deep_as_a_generator_makes_it_is_read() -> None:
    deep = " + ".join(["a[0]"] * 2000)
    read = program(f'extern "C" void echo(int *a) {{ a[1] = {deep}; }}')
    echo = function_named(read, "echo")
    assert sum(isinstance(one, Index) for one in nodes(echo.body)) == 2001


def test_this_in_a_lambda_is_the_object_of_the_method_around_it() -> None:
    text = """
        struct unit {
          int *mem;
          void run(int n) { auto put = [this](int i) { mem[i] = 0; }; put(n); }
        };
        extern "C" void echo(int *a) { unit u{a}; u.run(3); }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32) -> void
          let u: unit = {a}
          u.run(3)
        run(n: i32) -> void
          let put: callable = function operator()[&this]
          put!(n)
        operator()(i: i32) -> void
          *this.mem[i] = 0""")


def test_packs_are_expanded() -> None:
    text = """
        template <typename... F> void all(int *p, F... f) { (f(p), ...); }
        template <int... I> void put(int *p) { ((p[I] = sizeof...(I)), ...); }
        void clear(int *p) { p[0] = 0; }
        extern "C" void echo(int *a) { all(a, clear, [](int *p) { p[1] = 1; }); put<4, 6>(a); }
    """
    assert (
        shown(text).splitlines()[:6]
        == lines("""
        top extern-c echo(a: *i32) -> void
          all(a, function clear, function operator())
          put(a)
        all(p: *i32, f: callable, f: callable) -> void
          f!(p) , f!(p)
        clear(p: *i32) -> void""").splitlines()
    )
    assert "(p[4] = 2) , (p[6] = 2)" in shown(text)


def test_members_start_with_what_their_class_says() -> None:
    text = """
        struct reader { const int *from; int at = 0; };
        struct counter { int n; counter() : n(5) {} };
        template <int N> struct window { int size = N; counter count; reader in; };
        struct late : reader {
          int by;
          late(const int *f, int b) : by(b) { from = f; }
          late(const int *f) : late(f, 1) {}
        };
        struct span { int first = 2, last = 9; };
        extern "C" void echo(int *a) {
          late one(a);
          window<4> two;
          span three = {7}, four{.last = 8}, five;
          a[one.at] = two.size + two.count.n + two.in.at + three.last + four.first + five.last;
        }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32) -> void
          let one: late = new late(a)
          let two: window = new window()
          let three: span = {7, 9}
          let four: span = {2, 8}
          let five: span = new span()
          a[<reader>one.at] = (((((two.size + two.count.n) + two.in.at) + three.last) + four.first) + five.last)
        late(f: *i32) -> void : late=new late(f, 1)
        window() -> void : size=4, count=new counter(), in={opaque<a member without an initial value>(), 0}
        span() -> void : first=2, last=9
        late(f: *i32, b: i32) -> void : at=0, by=b
          *this.from = f
        counter() -> void : n=5""")
