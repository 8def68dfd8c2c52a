// PCL (Debian libpcl-dev): neighbours, normals, thinning, stray points, planes by region growing; two threads where it offers them.
#include <omp.h>
#include <pcl/features/normal_3d_omp.h>
#include <pcl/filters/statistical_outlier_removal.h>
#include <pcl/filters/voxel_grid.h>
#include <pcl/point_types.h>
#include <pcl/search/kdtree.h>
#include <pcl/segmentation/region_growing.h>
#include "cloud.h"

using P = pcl::PointXYZ;

int main(int argc, char** argv) {
    Bench bench("PCL", argc, argv);
    pcl::PointCloud<P>::Ptr cloud(new pcl::PointCloud<P>);
    {
        Cloud c = read_cloud(argv[1]);
        cloud->resize(c.size());
        for (std::size_t i = 0; i < c.size(); i++) (*cloud)[i] = P(c.x[i], c.y[i], c.z[i]);
    }
    const long n = static_cast<long>(cloud->size());
    omp_set_num_threads(2);
    std::vector<float> last(n);
    bench.run("knn16", [&] {
        pcl::search::KdTree<P> tree(false);
        tree.setInputCloud(cloud);
        #pragma omp parallel
        {
            std::vector<int> found(16); std::vector<float> far(16);
            #pragma omp for schedule(dynamic, 4096)
            for (long i = 0; i < n; i++) { tree.nearestKSearch((*cloud)[i], 16, found, far); last[i] = far[15]; }
        }
        return std::string("with the tree");
    });
    write_raw(bench.file("knn16"), last);
    std::vector<std::int32_t> many(n);
    bench.run("radius5cm", [&] {
        pcl::search::KdTree<P> tree(false);
        tree.setInputCloud(cloud);
        #pragma omp parallel
        {
            std::vector<int> found; std::vector<float> far;
            #pragma omp for schedule(dynamic, 4096)
            for (long i = 0; i < n; i++) many[i] = tree.radiusSearch((*cloud)[i], 0.05, found, far);
        }
        return std::string("with the tree");
    });
    write_raw(bench.file("radius5cm"), many);
    pcl::PointCloud<pcl::Normal>::Ptr normals(new pcl::PointCloud<pcl::Normal>);
    auto estimate = [&] {
        pcl::NormalEstimationOMP<P, pcl::Normal> by(2);
        pcl::search::KdTree<P>::Ptr tree(new pcl::search::KdTree<P>);
        by.setInputCloud(cloud); by.setSearchMethod(tree); by.setKSearch(16);
        by.compute(*normals);
    };
    bench.run("normals16", [&] { estimate(); return std::string("with the tree"); });
    if (normals->empty()) estimate();
    std::vector<float> out(3 * n);
    for (long i = 0; i < n; i++) for (int d = 0; d < 3; d++) out[3 * i + d] = (*normals)[i].normal[d];
    write_raw(bench.file("normals16"), out);
    bench.run("voxel4cm", [&] {
        pcl::PointCloud<P> kept;
        pcl::VoxelGrid<P> by;
        by.setInputCloud(cloud); by.setLeafSize(0.04f, 0.04f, 0.04f);
        by.filter(kept);
        return std::to_string(kept.size()) + " kept";
    });
    std::vector<std::uint8_t> kept(n);
    bench.run("outliers", [&] {
        pcl::StatisticalOutlierRemoval<P> by;
        std::vector<int> in;
        by.setInputCloud(cloud); by.setMeanK(16); by.setStddevMulThresh(2.0);
        by.filter(in);
        std::fill(kept.begin(), kept.end(), 0);
        for (int i : in) kept[i] = 1;
        return std::to_string(in.size()) + " kept";
    });
    write_raw(bench.file("outliers"), kept);
    std::vector<std::int32_t> face(n);
    bench.run("faces", [&] {
        estimate();
        pcl::search::KdTree<P>::Ptr tree(new pcl::search::KdTree<P>);
        pcl::RegionGrowing<P, pcl::Normal> by;
        std::vector<pcl::PointIndices> found;
        by.setMinClusterSize(150); by.setMaxClusterSize(static_cast<int>(n)); by.setSearchMethod(tree); by.setNumberOfNeighbours(16);
        by.setInputCloud(cloud); by.setInputNormals(normals);
        by.setSmoothnessThreshold(8.0f * 3.14159265f / 180); by.setCurvatureThreshold(0.03f);
        by.extract(found);
        std::fill(face.begin(), face.end(), 0);
        for (std::size_t k = 0; k < found.size(); k++) for (int i : found[k].indices) face[i] = static_cast<std::int32_t>(k + 1);
        return "normals and region growing, " + std::to_string(found.size()) + " regions";
    });
    write_raw(bench.file("faces"), face);
    return 0;
}
