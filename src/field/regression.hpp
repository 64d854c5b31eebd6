#pragma once
#include <optional>
#include <vector>

/// Internal to field: straight least squares on daily values.
namespace dutygauge::field {

struct Regression {
  std::vector<double> coefficient, standard_error;  ///< errors by the scatter about the fit
  double loss = 0;                                  ///< sum of squared residuals
  double scatter = 0;                               ///< standard deviation of a residual
  double effective = 0;  ///< independent points, by the residuals' lag-1 correlation
};

/// What becomes of rows more than 5 robust deviations off a first fit. Losses of several fits
/// to the same values compare only with all rows kept.
enum class Outliers { kept, left_out };

/// y = sum of coefficients x columns. Empty with fewer than 3 rows more than columns, or
/// columns that are not independent.
std::optional<Regression> regress(const std::vector<std::vector<double>>& rows, const std::vector<double>& y,
                                  Outliers outliers);

}  // namespace dutygauge::field
