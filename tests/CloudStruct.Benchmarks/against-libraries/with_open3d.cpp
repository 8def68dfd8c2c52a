// Open3D (Debian libopen3d-dev): neighbours, normals, thinning, stray points, reading.
#include <omp.h>
#include <open3d/geometry/KDTreeFlann.h>
#include <open3d/geometry/PointCloud.h>
#include <open3d/io/PointCloudIO.h>
#include "cloud.h"

using namespace open3d;

int main(int argc, char** argv) {
    Bench bench("Open3D", argc, argv);
    omp_set_num_threads(2);
    geometry::PointCloud cloud;
    {
        Cloud c = read_cloud(argv[1]);
        cloud.points_.resize(c.size());
        for (std::size_t i = 0; i < c.size(); i++) cloud.points_[i] = {c.x[i], c.y[i], c.z[i]};
    }
    const long n = static_cast<long>(cloud.points_.size());
    std::vector<float> last(n);
    bench.run("knn16", [&] {
        geometry::KDTreeFlann tree(cloud);
        #pragma omp parallel
        {
            std::vector<int> found; std::vector<double> far;
            #pragma omp for schedule(dynamic, 4096)
            for (long i = 0; i < n; i++) { tree.SearchKNN(cloud.points_[i], 16, found, far); last[i] = static_cast<float>(far[15]); }
        }
        return std::string("with the tree");
    });
    write_raw(bench.file("knn16"), last);
    std::vector<std::int32_t> many(n);
    bench.run("radius5cm", [&] {
        geometry::KDTreeFlann tree(cloud);
        #pragma omp parallel
        {
            std::vector<int> found; std::vector<double> far;
            #pragma omp for schedule(dynamic, 4096)
            for (long i = 0; i < n; i++) many[i] = tree.SearchRadius(cloud.points_[i], 0.05, found, far);
        }
        return std::string("with the tree");
    });
    write_raw(bench.file("radius5cm"), many);
    bench.run("normals16", [&] {
        cloud.normals_.clear();
        cloud.EstimateNormals(geometry::KDTreeSearchParamKNN(16));
        return std::string("with the tree");
    });
    std::vector<float> out(3 * cloud.normals_.size());
    for (std::size_t i = 0; i < cloud.normals_.size(); i++) for (int d = 0; d < 3; d++) out[3 * i + d] = static_cast<float>(cloud.normals_[i][d]);
    write_raw(bench.file("normals16"), out);
    cloud.normals_.clear();
    bench.run("voxel4cm", [&] { return std::to_string(cloud.VoxelDownSample(0.04)->points_.size()) + " kept"; });
    std::vector<std::uint8_t> kept(n);
    bench.run("outliers", [&] {
        auto in = std::get<1>(cloud.RemoveStatisticalOutliers(16, 2.0));
        std::fill(kept.begin(), kept.end(), 0);
        for (auto i : in) kept[i] = 1;
        return std::to_string(in.size()) + " kept";
    });
    write_raw(bench.file("outliers"), kept);
    bench.run("read_ply", [&] {
        geometry::PointCloud read;
        io::ReadPointCloud(argv[1], read);
        return std::to_string(read.points_.size()) + " points";
    });
    return 0;
}
