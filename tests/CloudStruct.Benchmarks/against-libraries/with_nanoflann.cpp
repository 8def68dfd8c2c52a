// nanoflann (header library, Debian libnanoflann-dev): exact neighbours, queries shared by two threads.
#include <nanoflann.hpp>
#include <omp.h>
#include "cloud.h"

struct Points {
    const Cloud& c;
    std::size_t kdtree_get_point_count() const { return c.size(); }
    float kdtree_get_pt(std::size_t i, std::size_t d) const { return d == 0 ? c.x[i] : d == 1 ? c.y[i] : c.z[i]; }
    template <class B> bool kdtree_get_bbox(B&) const { return false; }
};
using Tree = nanoflann::KDTreeSingleIndexAdaptor<nanoflann::L2_Simple_Adaptor<float, Points>, Points, 3, std::uint32_t>;

int main(int argc, char** argv) {
    Bench bench("nanoflann", argc, argv);
    Cloud cloud = read_cloud(argv[1]);
    Points points{cloud};
    const long n = static_cast<long>(cloud.size());
    omp_set_num_threads(2);
    std::vector<float> last(n);
    bench.run("knn16", [&] {
        Tree tree(3, points, nanoflann::KDTreeSingleIndexAdaptorParams(12));
        tree.buildIndex();
        #pragma omp parallel for schedule(dynamic, 4096)
        for (long i = 0; i < n; i++) {
            std::uint32_t found[16]; float far[16];
            const float q[3] = {cloud.x[i], cloud.y[i], cloud.z[i]};
            tree.knnSearch(q, 16, found, far);
            last[i] = far[15];
        }
        return std::string("with the tree");
    });
    write_raw(bench.file("knn16"), last);
    std::vector<std::int32_t> many(n);
    bench.run("radius5cm", [&] {
        Tree tree(3, points, nanoflann::KDTreeSingleIndexAdaptorParams(12));
        tree.buildIndex();
        #pragma omp parallel for schedule(dynamic, 4096)
        for (long i = 0; i < n; i++) {
            std::vector<std::pair<std::uint32_t, float>> found;
            const float q[3] = {cloud.x[i], cloud.y[i], cloud.z[i]};
            many[i] = static_cast<std::int32_t>(tree.radiusSearch(q, 0.05f * 0.05f, found, nanoflann::SearchParams(32, 0.0f, false)));
        }
        return std::string("with the tree");
    });
    write_raw(bench.file("radius5cm"), many);
    return 0;
}
