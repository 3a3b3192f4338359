// Gravity potential of a model by GeographicLib's GravityModel, for the points on standard input.
//   g++ -O2 reference.cpp -o reference -lGeographicLib
//   reference values MODEL FOLDER DEGREE A F < points      lat lon h (degrees, metres) per line
//     prints  W V gx gy gz  with 17 digits per line; g in local axes east, north, up
//   reference time MODEL FOLDER DEGREE SECONDS
//     prints  milliseconds of processor time per point of W with its gradient (GravityModel::W), and of the disturbing potential without
//     (GravityModel::T), and of W on a circle of latitude (GravityCircle)
// Debian package libgeographiclib-dev.
#include <GeographicLib/Geocentric.hpp>
#include <GeographicLib/GravityCircle.hpp>
#include <GeographicLib/GravityModel.hpp>
#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <ctime>
#include <string>

using namespace GeographicLib;

static double sink = 0;

template <class F> double millisecondsPerCall(double seconds, F f) {
  f(0);
  long calls = 0;
  const auto start = std::clock();  // processor time
  double elapsed = 0;
  do {
    for (int i = 0; i < 4; ++i) f(calls++);
    elapsed = double(std::clock() - start) / CLOCKS_PER_SEC;
  } while (elapsed < seconds);
  return 1e3 * elapsed / calls;
}

int main(int argc, char** argv) {
  if (argc < 6) return 2;
  const std::string what = argv[1];
  const int degree = std::atoi(argv[4]);
  const GravityModel model(argv[2], argv[3], degree, degree);
  if (what == "values") {
    const Geocentric earth(std::atof(argv[5]), std::atof(argv[6]));
    double lat, lon, h;
    while (std::scanf("%lf %lf %lf", &lat, &lon, &h) == 3) {
      double x, y, z, gx, gy, gz;
      earth.Forward(lat, lon, h, x, y, z);
      const double w = model.W(x, y, z, gx, gy, gz);
      const double v = model.V(x, y, z, gx, gy, gz);
      double east, north, up;
      model.Gravity(lat, lon, h, east, north, up);
      std::printf("%.17g %.17g %.17g %.17g %.17g\n", w, v, east, north, up);
    }
    return 0;
  }
  const double seconds = std::atof(argv[5]);
  const Geocentric earth(Constants::WGS84_a(), Constants::WGS84_f());
  const auto at = [&](long i, double& x, double& y, double& z) {
    earth.Forward(std::fmod(17.3 * i, 170) - 85, std::fmod(47.9 * i, 360) - 180, 500, x, y, z);
  };
  const double w = millisecondsPerCall(seconds, [&](long i) {
    double x, y, z, gx, gy, gz;
    at(i, x, y, z);
    sink += model.W(x, y, z, gx, gy, gz);
  });
  const double t = millisecondsPerCall(seconds, [&](long i) {
    double x, y, z;
    at(i, x, y, z);
    sink += model.T(x, y, z);
  });
  const GravityCircle circle = model.Circle(52.3, 100, GravityModel::GRAVITY);
  const double c = millisecondsPerCall(seconds, [&](long i) {
    double gx, gy, gz;
    sink += circle.W(std::fmod(47.9 * i, 360) - 180, gx, gy, gz);
  });
  std::printf("%.6g %.6g %.6g\n", w, t, c);
  return std::isfinite(sink) ? 0 : 1;
}
