// The other way to measure a Catmull-Clark limit surface: a feature-adaptive patch table with B-spline end caps, 5 x 5 Gauss nodes a patch,
// ten moments about the origin. Isolation grows until the volume is within the tolerance of the value given.
// Usage: patch-quadrature <cage.bin> <volume> <tolerance>. The cage: vertices, faces, corners (int32 each), positions (float64), face sizes and corners (int32).
// Prints one line: isolation, processor milliseconds (topology, refinement, patches and quadrature of that isolation), volume, peak memory in kB.
#include <cmath>
#include <cstdint>
#include <cstdio>
#include <cstdlib>
#include <ctime>
#include <map>
#include <memory>
#include <string>
#include <sys/resource.h>
#include <vector>

#include <opensubdiv/far/patchTableFactory.h>
#include <opensubdiv/far/primvarRefiner.h>
#include <opensubdiv/far/topologyDescriptor.h>

using namespace OpenSubdiv;

namespace {

constexpr int NODES = 5;
constexpr int MOST_ISOLATION = 10;

struct Cage {
  std::vector<double> positions;
  std::vector<int> sizes;
  std::vector<int> corners;
};

struct Point {
  double v[3];
  void Clear() { v[0] = v[1] = v[2] = 0; }
  void AddWithWeight(Point const &other, double weight) {
    for (int i = 0; i < 3; i++) v[i] += weight * other.v[i];
  }
};

// Basis values and derivatives at all nodes, 16 each; the derivatives times the patch's width, so that they fit every level.
struct Basis {
  double value[NODES * NODES][16], ds[NODES * NODES][16], dt[NODES * NODES][16];
};

template <class T> void readAll(FILE *file, std::vector<T> &into) {
  if (!into.empty() && std::fread(into.data(), sizeof(T), into.size(), file) != into.size()) {
    std::fprintf(stderr, "the cage ends too early\n");
    std::exit(1);
  }
}

Cage readCage(char const *path) {
  FILE *file = std::fopen(path, "rb");
  if (file == nullptr) {
    std::fprintf(stderr, "the cage cannot be opened\n");
    std::exit(1);
  }
  std::vector<int32_t> counts(3);
  readAll(file, counts);
  Cage cage{std::vector<double>(3 * counts[0]), std::vector<int>(counts[1]), std::vector<int>(counts[2])};
  readAll(file, cage.positions);
  readAll(file, cage.sizes);
  readAll(file, cage.corners);
  std::fclose(file);
  return cage;
}

// Gauss-Legendre with 5 nodes on [0, 1]; Abramowitz & Stegun, table 25.4.
double const THIRD = std::sqrt(10.0 / 7.0);
double const NODE[NODES] = {0.5 - std::sqrt(5 + 2 * THIRD) / 6, 0.5 - std::sqrt(5 - 2 * THIRD) / 6, 0.5, 0.5 + std::sqrt(5 - 2 * THIRD) / 6, 0.5 + std::sqrt(5 + 2 * THIRD) / 6};
double const OUTER = (322 - 13 * std::sqrt(70.0)) / 1800, INNER = (322 + 13 * std::sqrt(70.0)) / 1800;
double const WEIGHT[NODES] = {OUTER, INNER, 64.0 / 225, INNER, OUTER};

Basis makeBasis(Far::PatchTable const &table, Far::PatchTable::PatchHandle const &handle, Far::PatchParam const &param) {
  Basis basis;
  double const width = 1.0 / (1 << param.GetDepth());
  for (int i = 0; i < NODES; i++) {
    for (int j = 0; j < NODES; j++) {
      double u = NODE[i], v = NODE[j];
      param.Unnormalize(u, v);
      double value[16], ds[16], dt[16];
      table.EvaluateBasis(handle, u, v, value, ds, dt);
      for (int k = 0; k < 16; k++) {
        basis.value[NODES * i + j][k] = value[k];
        basis.ds[NODES * i + j][k] = ds[k] * width;
        basis.dt[NODES * i + j][k] = dt[k] * width;
      }
    }
  }
  return basis;
}

void addPatch(Basis const &basis, double const net[3][16], double sums[10]) {
  for (int n = 0; n < NODES * NODES; n++) {
    double x[3], s[3], t[3];
    for (int axis = 0; axis < 3; axis++) {
      double a = 0, b = 0, c = 0;
      for (int k = 0; k < 16; k++) {
        a += basis.value[n][k] * net[axis][k];
        b += basis.ds[n][k] * net[axis][k];
        c += basis.dt[n][k] * net[axis][k];
      }
      x[axis] = a;
      s[axis] = b;
      t[axis] = c;
    }
    double const det = x[0] * (s[1] * t[2] - s[2] * t[1]) + x[1] * (s[2] * t[0] - s[0] * t[2]) + x[2] * (s[0] * t[1] - s[1] * t[0]);
    double const d = WEIGHT[n / NODES] * WEIGHT[n % NODES] * det;
    sums[0] += d / 3;
    for (int i = 0; i < 3; i++) sums[1 + i] += d * x[i] / 4;
    for (int i = 0; i < 3; i++) sums[4 + i] += d * x[i] * x[i] / 5;
    sums[7] += d * x[0] * x[1] / 5;
    sums[8] += d * x[0] * x[2] / 5;
    sums[9] += d * x[1] * x[2] / 5;
  }
}

double measure(Cage const &cage, int isolation) {
  Far::TopologyDescriptor descriptor;
  descriptor.numVertices = static_cast<int>(cage.positions.size() / 3);
  descriptor.numFaces = static_cast<int>(cage.sizes.size());
  descriptor.numVertsPerFace = cage.sizes.data();
  descriptor.vertIndicesPerFace = cage.corners.data();
  Sdc::Options options;
  options.SetVtxBoundaryInterpolation(Sdc::Options::VTX_BOUNDARY_EDGE_AND_CORNER);
  using Factory = Far::TopologyRefinerFactory<Far::TopologyDescriptor>;
  std::unique_ptr<Far::TopologyRefiner> refiner(Factory::Create(descriptor, Factory::Options(Sdc::SCHEME_CATMARK, options)));
  Far::PatchTableFactory::Options patchOptions(isolation);
  patchOptions.SetEndCapType(Far::PatchTableFactory::Options::ENDCAP_BSPLINE_BASIS);
  patchOptions.SetPatchPrecision<double>();
  patchOptions.useInfSharpPatch = true;
  patchOptions.generateLegacySharpCornerPatches = false;
  refiner->RefineAdaptive(patchOptions.GetRefineAdaptiveOptions());
  std::unique_ptr<Far::PatchTable> table(Far::PatchTableFactory::Create(*refiner, patchOptions));

  int const refined = refiner->GetNumVerticesTotal();
  std::vector<Point> points(refined + table->GetNumLocalPoints());
  for (int v = 0; v < descriptor.numVertices; v++) for (int i = 0; i < 3; i++) points[v].v[i] = cage.positions[3 * v + i];
  Far::PrimvarRefinerReal<double> primvar(*refiner);
  Point *from = points.data();
  for (int level = 1; level <= refiner->GetMaxLevel(); level++) {
    Point *to = from + refiner->GetLevel(level - 1).GetNumVertices();
    primvar.Interpolate(level, from, to);
    from = to;
  }
  if (table->GetNumLocalPoints() > 0) table->GetLocalPointStencilTable<double>()->UpdateValues(points.data(), points.data() + refined);

  std::map<int, Basis> bases;
  double sums[10] = {0};
  for (int array = 0; array < table->GetNumPatchArrays(); array++) {
    for (int patch = 0; patch < table->GetNumPatches(array); patch++) {
      Far::PatchParam const param = table->GetPatchParam(array, patch);
      Far::ConstIndexArray const vertices = table->GetPatchVertices(array, patch);
      auto found = bases.find(param.GetBoundary());
      if (found == bases.end()) {
        Far::PatchTable::PatchHandle handle;
        handle.arrayIndex = array;
        handle.patchIndex = patch;
        handle.vertIndex = patch * vertices.size();
        for (int before = 0; before < array; before++) handle.patchIndex += table->GetNumPatches(before);
        found = bases.emplace(param.GetBoundary(), makeBasis(*table, handle, param)).first;
      }
      double net[3][16];
      for (int k = 0; k < 16; k++) for (int i = 0; i < 3; i++) net[i][k] = points[vertices[k]].v[i];
      addPatch(found->second, net, sums);
    }
  }
  return sums[0];
}

}

int main(int count, char **arguments) {
  if (count != 4) {
    std::fprintf(stderr, "usage: patch-quadrature <cage.bin> <volume> <tolerance>\n");
    return 2;
  }
  Cage const cage = readCage(arguments[1]);
  double const wanted = std::atof(arguments[2]), tolerance = std::atof(arguments[3]);
  for (int isolation = 1; isolation <= MOST_ISOLATION; isolation++) {
    // The best of three: the first one pays for fresh memory.
    double best = INFINITY, volume = 0;
    for (int round = 0; round < 3; round++) {
      std::clock_t const start = std::clock();
      volume = measure(cage, isolation);
      best = std::fmin(best, 1000.0 * double(std::clock() - start) / CLOCKS_PER_SEC);
      if (std::fabs(volume / wanted - 1) > tolerance && isolation < MOST_ISOLATION) break;
    }
    if (std::fabs(volume / wanted - 1) > tolerance && isolation < MOST_ISOLATION) continue;
    rusage usage;
    getrusage(RUSAGE_SELF, &usage);
    std::printf("%d %.3f %.17g %ld\n", isolation, best, volume, usage.ru_maxrss);
    return 0;
  }
}
