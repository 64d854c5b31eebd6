#include "dutygauge/rating.hpp"

namespace dutygauge::rating {

Rating rate(const Problem& problem) {
  Rating mean = rate_mean(problem), march = rate_march(problem);
  const bool by_march = problem.methods.solution == Solution::march;
  Rating& chosen = by_march ? march : mean;
  chosen.mean_duty = mean.mean_duty;
  chosen.march_duty = march.march_duty;
  return std::move(chosen);
}

}  // namespace dutygauge::rating
