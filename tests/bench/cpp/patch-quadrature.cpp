// The other way to measure a Catmull-Clark limit surface: a feature-adaptive patch table with B-spline end caps, 5 x 5 Gauss nodes a patch,
// ten moments of the solid about the origin, ten of the surface too if asked. Isolation grows until the volume is within the tolerance of the value given.
// Usage: patch-quadrature <cage.bin> <volume> <tolerance> solids|areas. The cage: vertices, faces, corners (int32 each), positions (float64), face sizes and corners (int32).
// Prints one line: isolation, processor milliseconds (topology, refinement, patches and quadrature of that isolation), volume, peak memory in kB, area.
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
constexpr int ROUNDS = 7;

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

// Nodes of a patch, made up to whole vectors by nodes without weight.
constexpr int ALL = 32;

// Basis values and derivatives at all nodes, for each of the 16 control points, so that the compiler's vectors run along the nodes;
// the derivatives times the patch's width, so that they fit every level.
struct alignas(64) Basis {
  double value[16][ALL], ds[16][ALL], dt[16][ALL];
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
  Basis basis{};
  double const width = 1.0 / (1 << param.GetDepth());
  for (int i = 0; i < NODES; i++) {
    for (int j = 0; j < NODES; j++) {
      double u = NODE[i], v = NODE[j];
      param.Unnormalize(u, v);
      double value[16], ds[16], dt[16];
      table.EvaluateBasis(handle, u, v, value, ds, dt);
      for (int k = 0; k < 16; k++) {
        basis.value[k][NODES * i + j] = value[k];
        basis.ds[k][NODES * i + j] = ds[k] * width;
        basis.dt[k][NODES * i + j] = dt[k] * width;
      }
    }
  }
  return basis;
}

struct alignas(64) Nodes {
  double x[3][ALL], s[3][ALL], t[3][ALL];
};

struct alignas(64) Weights {
  double at[ALL];
  Weights() : at{} {
    for (int n = 0; n < NODES * NODES; n++) at[n] = WEIGHT[n / NODES] * WEIGHT[n % NODES];
  }
};

Weights const WEIGHTS;

// Sums per node, added up over the patches: ten of the solid and ten of the surface are made of these at the end.
struct alignas(64) Sums {
  double at[20][ALL];
};

template <bool AREAS> void addPatch(Basis const &basis, double const net[3][16], Sums &sums) {
  Nodes nodes;
  for (int axis = 0; axis < 3; axis++) {
    double x[ALL] = {0}, s[ALL] = {0}, t[ALL] = {0};
    for (int k = 0; k < 16; k++) {
      double const c = net[axis][k];
      for (int n = 0; n < ALL; n++) {
        x[n] += basis.value[k][n] * c;
        s[n] += basis.ds[k][n] * c;
        t[n] += basis.dt[k][n] * c;
      }
    }
    for (int n = 0; n < ALL; n++) {
      nodes.x[axis][n] = x[n];
      nodes.s[axis][n] = s[n];
      nodes.t[axis][n] = t[n];
    }
  }
  auto const &[x, s, t] = nodes;
  for (int n = 0; n < ALL; n++) {
    double const det = x[0][n] * (s[1][n] * t[2][n] - s[2][n] * t[1][n]) + x[1][n] * (s[2][n] * t[0][n] - s[0][n] * t[2][n]) + x[2][n] * (s[0][n] * t[1][n] - s[1][n] * t[0][n]);
    double const d = WEIGHTS.at[n] * det;
    double const dx = d * x[0][n], dy = d * x[1][n], dz = d * x[2][n];
    sums.at[0][n] += d;
    sums.at[1][n] += dx;
    sums.at[2][n] += dy;
    sums.at[3][n] += dz;
    sums.at[4][n] += dx * x[0][n];
    sums.at[5][n] += dy * x[1][n];
    sums.at[6][n] += dz * x[2][n];
    sums.at[7][n] += dx * x[1][n];
    sums.at[8][n] += dx * x[2][n];
    sums.at[9][n] += dy * x[2][n];
  }
  if constexpr (AREAS) {
    for (int n = 0; n < ALL; n++) {
      double const nx = s[1][n] * t[2][n] - s[2][n] * t[1][n], ny = s[2][n] * t[0][n] - s[0][n] * t[2][n], nz = s[0][n] * t[1][n] - s[1][n] * t[0][n];
      double const a = WEIGHTS.at[n] * std::sqrt(nx * nx + ny * ny + nz * nz);
      double const ax = a * x[0][n], ay = a * x[1][n], az = a * x[2][n];
      sums.at[10][n] += a;
      sums.at[11][n] += ax;
      sums.at[12][n] += ay;
      sums.at[13][n] += az;
      sums.at[14][n] += ax * x[0][n];
      sums.at[15][n] += ay * x[1][n];
      sums.at[16][n] += az * x[2][n];
      sums.at[17][n] += ax * x[1][n];
      sums.at[18][n] += ax * x[2][n];
      sums.at[19][n] += ay * x[2][n];
    }
  }
}

// The moments; all of them are made, so that no compiler leaves out what is not printed.
void finish(Sums const &sums, double moments[20]) {
  for (int i = 0; i < 20; i++) {
    moments[i] = 0;
    for (int n = 0; n < ALL; n++) moments[i] += sums.at[i][n];
    moments[i] /= i == 0 ? 3 : i < 4 ? 4 : i < 10 ? 5 : 1;
  }
}

template <bool AREAS> void measure(Cage const &cage, int isolation, double moments[20]) {
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
  Sums sums{};
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
      addPatch<AREAS>(found->second, net, sums);
    }
  }
  finish(sums, moments);
}

}

int main(int count, char **arguments) {
  if (count != 5) {
    std::fprintf(stderr, "usage: patch-quadrature <cage.bin> <volume> <tolerance> solids|areas\n");
    return 2;
  }
  Cage const cage = readCage(arguments[1]);
  double const wanted = std::atof(arguments[2]), tolerance = std::atof(arguments[3]);
  bool const areas = std::string(arguments[4]) == "areas";
  for (int isolation = 1; isolation <= MOST_ISOLATION; isolation++) {
    // The best of some: the first one pays for fresh memory.
    double best = INFINITY, moments[20];
    double volume = 0;
    for (int round = 0; round < ROUNDS; round++) {
      std::clock_t const start = std::clock();
      if (areas) measure<true>(cage, isolation, moments);
      else measure<false>(cage, isolation, moments);
      best = std::fmin(best, 1000.0 * double(std::clock() - start) / CLOCKS_PER_SEC);
      volume = moments[0];
      if (std::fabs(volume / wanted - 1) > tolerance && isolation < MOST_ISOLATION) break;
    }
    if (std::fabs(volume / wanted - 1) > tolerance && isolation < MOST_ISOLATION) continue;
    rusage usage;
    getrusage(RUSAGE_SELF, &usage);
    std::printf("%d %.3f %.17g %ld %.17g\n", isolation, best, volume, usage.ru_maxrss, moments[10]);
    return 0;
  }
}
