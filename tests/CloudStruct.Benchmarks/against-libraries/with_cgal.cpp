// CGAL (Debian libcgal-dev): neighbours, normals, thinning, stray points, planes by RANSAC and by region growing, two-class graph cut.
#include <CGAL/Exact_predicates_inexact_constructions_kernel.h>
#include <CGAL/Orthogonal_k_neighbor_search.h>
#include <CGAL/Point_set_3.h>
#include <CGAL/Search_traits_3.h>
#include <CGAL/Search_traits_adapter.h>
#include <CGAL/Shape_detection/Efficient_RANSAC.h>
#include <CGAL/boost/graph/alpha_expansion_graphcut.h>
#include <CGAL/boost/graph/Alpha_expansion_MaxFlow_tag.h>
#include <CGAL/grid_simplify_point_set.h>
#include <CGAL/pca_estimate_normals.h>
#include <CGAL/property_map.h>
#include <CGAL/remove_outliers.h>
#include <cmath>
#include "cloud.h"

using K = CGAL::Exact_predicates_inexact_constructions_kernel;
using Point = K::Point_3;
using Vector = K::Vector_3;
using PN = std::pair<Point, Vector>;
using PMap = CGAL::First_of_pair_property_map<PN>;
using NMap = CGAL::Second_of_pair_property_map<PN>;
using Traits = CGAL::Shape_detection::Efficient_RANSAC_traits<K, std::vector<PN>, PMap, NMap>;
using Ransac = CGAL::Shape_detection::Efficient_RANSAC<Traits>;
using Plane = CGAL::Shape_detection::Plane<Traits>;
using PI = boost::tuple<Point, int>;
using TreeTraits = CGAL::Search_traits_adapter<PI, CGAL::Nth_of_tuple_property_map<0, PI>, CGAL::Search_traits_3<K>>;
using Search = CGAL::Orthogonal_k_neighbor_search<TreeTraits>;

#ifdef CGAL_LINKED_WITH_TBB
using Tag = CGAL::Parallel_tag;
#else
using Tag = CGAL::Sequential_tag;
#endif

int main(int argc, char** argv) {
    Bench bench("CGAL", argc, argv);
    Cloud c = read_cloud(argv[1]);
    const std::size_t n = c.size();
    std::vector<PN> points(n);
    for (std::size_t i = 0; i < n; i++) points[i].first = Point(c.x[i], c.y[i], c.z[i]);
    auto estimate = [&] {
        CGAL::pca_estimate_normals<Tag>(points, 16, CGAL::parameters::point_map(PMap()).normal_map(NMap()));
    };
    bench.run("normals16", [&] { estimate(); return std::string("with the tree"); });
    if (bench.only.empty() || bench.only == "normals16") {
        std::vector<float> out(3 * n);
        for (std::size_t i = 0; i < n; i++) for (int d = 0; d < 3; d++) out[3 * i + d] = static_cast<float>(points[i].second[d]);
        write_raw(bench.file("normals16"), out);
    }
    bench.run("voxel4cm", [&] {
        std::vector<Point> copy(n);
        for (std::size_t i = 0; i < n; i++) copy[i] = points[i].first;
        return std::to_string(CGAL::grid_simplify_point_set(copy, 0.04) - copy.begin()) + " kept";
    });
    bench.run("outliers", [&] {
        std::vector<PI> copy(n);
        for (std::size_t i = 0; i < n; i++) copy[i] = PI(points[i].first, static_cast<int>(i));
        // It removes a share and no multiple of the spread: the true share is given.
        auto first = CGAL::remove_outliers<Tag>(copy, 16, CGAL::parameters::point_map(CGAL::Nth_of_tuple_property_map<0, PI>()).threshold_percent(0.5));
        std::vector<std::uint8_t> kept(n, 0);
        for (auto it = copy.begin(); it != first; ++it) kept[boost::get<1>(*it)] = 1;
        write_raw(bench.file("outliers"), kept);
        return std::to_string(first - copy.begin()) + " kept, its share of strays given";
    });
    bench.run("faces", [&] {
        estimate();
        Ransac by;
        by.set_input(points, PMap(), NMap());
        by.add_shape_factory<Plane>();
        Ransac::Parameters p;
        p.probability = 0.01; p.min_points = 150; p.epsilon = 0.015; p.cluster_epsilon = 0.06; p.normal_threshold = 0.9;
        CGAL::get_default_random() = CGAL::Random(1);
        by.detect(p);
        std::vector<std::int32_t> face(n, 0);
        int k = 0;
        for (auto s : by.shapes()) { k++; for (std::size_t i : s->indices_of_assigned_points()) face[i] = k; }
        write_raw(bench.file("faces"), face);
        return "normals and Efficient RANSAC, " + std::to_string(k) + " planes";
    });
    bench.run("cut", [&] {
        // Unary: half the squared departure from either class's shade. Pairs: six nearest neighbours, weight 1.
        std::vector<PI> all(n);
        for (std::size_t i = 0; i < n; i++) all[i] = PI(points[i].first, static_cast<int>(i));
        Search::Tree tree(all.begin(), all.end());
        std::vector<std::pair<std::size_t, std::size_t>> edges;
        for (std::size_t i = 0; i < n; i++) {
            Search near(tree, points[i].first, 7);
            for (auto it = near.begin(); it != near.end(); ++it) {
                std::size_t j = static_cast<std::size_t>(boost::get<1>(it->first));
                if (j > i) edges.emplace_back(i, j);
            }
        }
        std::vector<double> weights(edges.size(), 1.0);
        std::vector<std::vector<double>> cost(2, std::vector<double>(n));
        std::vector<std::size_t> label(n);
        for (std::size_t i = 0; i < n; i++) {
            double a = c.shade[i] + 0.5, b = c.shade[i] - 0.5;
            cost[0][i] = a * a / 2; cost[1][i] = b * b / 2;
            label[i] = cost[1][i] < cost[0][i] ? 1 : 0;
        }
        CGAL::alpha_expansion_graphcut(edges, weights, cost, label, CGAL::Alpha_expansion_MaxFlow_tag());
        std::vector<std::uint8_t> out(n);
        for (std::size_t i = 0; i < n; i++) out[i] = static_cast<std::uint8_t>(label[i]);
        write_raw(bench.file("cut"), out);
        return std::to_string(edges.size()) + " edges, neighbours and its fastest flow included";
    });
    return 0;
}
