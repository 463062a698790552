struct gate { int range; friend std::ostream &operator<<(std::ostream &to, const gate &g) { return to << g.range; } };
int main(int argc, char **argv) {
    std::vector<int> v(8), w = {1, 2, 3}; std::iota(v.begin(), v.end(), 0);
    std::sort(v.begin(), v.end(), [](int a, int b) { return a > b; });
    std::cout << "gate " << gate{3} << ' ' << std::hex << std::setw(4) << ap_uint<8>(3) << std::endl;
    std::ifstream file(argv[1], std::ios::binary); std::string line;
    while (std::getline(file, line)) w.push_back(std::stoi(line)); std::map<std::string, int> count;
    for (auto &[name, n] : count) w[0] += n;
    auto start = std::chrono::steady_clock::now();
    std::chrono::duration<double> took = std::chrono::steady_clock::now() - start;
    std::function<int(int)> f = [&](int x) { return x + argc; }; std::unique_ptr<float[]> own(new float[4]);
    own[0] = f(3) + took.count();
    std::tuple<int, float> pair(1, 2); auto [a, b] = pair; std::thread t([&] { own[1] = a + b; }); t.join();
    printf("%d\n", rand() % 3);
    std::complex<float> c = std::polar(1.0f, (float)M_PI); c *= c + 2.0f; assert(std::abs(c) > 0 && "length");
    return v == w ? EXIT_SUCCESS : EXIT_FAILURE;
}
