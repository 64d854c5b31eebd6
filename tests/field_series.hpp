#pragma once
#include <boost/random/mersenne_twister.hpp>
#include <boost/random/normal_distribution.hpp>
#include <cmath>
#include <cstdint>

/// Made-up series for the tests of what is read from them; same seed, same series.
namespace series {

/// Scatter of which neighbours are alike: standard deviation `sigma`, lag-1 correlation `rho`.
class Noise {
 public:
  Noise(std::uint64_t seed, double sigma, double rho) : engine_(seed), sigma_(sigma), rho_(rho) {
    last_ = normal_(engine_);
  }
  double operator()() {
    last_ = rho_ * last_ + std::sqrt(1.0 - rho_ * rho_) * normal_(engine_);
    return sigma_ * last_;
  }

 private:
  boost::random::mt19937_64 engine_;
  boost::random::normal_distribution<> normal_;
  double sigma_, rho_, last_ = 0;
};

}  // namespace series
