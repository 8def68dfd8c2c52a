// What the programs of this folder share: reading the benchmark's cloud, timing, and telling the result in one line.
#pragma once
#include <algorithm>
#include <chrono>
#include <cstdint>
#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <fstream>
#include <functional>
#include <iostream>
#include <limits>
#include <sstream>
#include <string>
#include <vector>

struct Cloud {
    std::vector<float> x, y, z, shade;
    std::size_t size() const { return x.size(); }
};

// The layout that `blocky` writes: x y z nx ny nz shade as float, plane as int, side as uchar. Refuses any other.
inline Cloud read_cloud(const std::string& path) {
    std::ifstream in(path, std::ios::binary);
    std::string line, layout;
    std::size_t count = 0;
    while (std::getline(in, line) && line != "end_header") {
        std::istringstream words(line);
        std::string first, type, name;
        words >> first >> type >> name;
        if (first == "element") count = std::stoul(name);
        if (first == "property") layout += type + " " + name + ";";
    }
    const std::string wanted = "float x;float y;float z;float nx;float ny;float nz;float shade;int plane;uchar side;";
    if (layout != wanted) { std::cerr << path << ": not a cloud made by 'blocky': " << layout << "\n"; std::exit(3); }
    const std::size_t stride = 7 * 4 + 4 + 1;
    std::vector<char> bytes(count * stride);
    in.read(bytes.data(), static_cast<std::streamsize>(bytes.size()));
    Cloud c;
    c.x.resize(count); c.y.resize(count); c.z.resize(count); c.shade.resize(count);
    for (std::size_t i = 0; i < count; i++) {
        const char* p = bytes.data() + i * stride;
        std::memcpy(&c.x[i], p, 4); std::memcpy(&c.y[i], p + 4, 4); std::memcpy(&c.z[i], p + 8, 4); std::memcpy(&c.shade[i], p + 24, 4);
    }
    return c;
}

// Peak resident memory of this process [GiB].
inline double peak_gib() {
    std::ifstream in("/proc/self/status");
    std::string word;
    while (in >> word) if (word == "VmHWM:") { double kib; in >> kib; return kib / 1048576; }
    return 0;
}

template <class T>
void write_raw(const std::string& path, const std::vector<T>& values) {
    std::ofstream out(path, std::ios::binary);
    out.write(reinterpret_cast<const char*>(values.data()), static_cast<std::streamsize>(values.size() * sizeof(T)));
}

// Runs one kernel some times and prints the fastest as a line of JSON; `note` says what came out.
struct Bench {
    std::string library, folder, only;
    int rounds;

    Bench(const std::string& name, int argc, char** argv) : library(name) {
        if (argc < 3) { std::cerr << "usage: " << name << " CLOUD.ply OUT [ROUNDS] [KERNEL]\n"; std::exit(2); }
        folder = argv[2];
        rounds = argc > 3 ? std::atoi(argv[3]) : 1;
        only = argc > 4 ? argv[4] : "";
    }

    void run(const std::string& kernel, const std::function<std::string()>& work) const {
        if (!only.empty() && only != kernel) return;
        double best = std::numeric_limits<double>::infinity();
        std::string note;
        for (int r = 0; r < rounds; r++) {
            auto start = std::chrono::steady_clock::now();
            note = work();
            best = std::min(best, std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count());
        }
        std::printf("{\"library\": \"%s\", \"kernel\": \"%s\", \"seconds\": %.4f, \"peak_gib\": %.3f, \"note\": \"%s\"}\n", library.c_str(), kernel.c_str(), best, peak_gib(), note.c_str());
        std::fflush(stdout);
    }

    std::string file(const std::string& kernel) const { return folder + "/" + library + "." + kernel + ".raw"; }
};
