#include "regression.hpp"

#include <Eigen/Dense>
#include <algorithm>
#include <cmath>

namespace dutygauge::field {
namespace {

struct Table {
  Eigen::MatrixXd rows;
  Eigen::VectorXd y;
};

Table table_of(const std::vector<std::vector<double>>& rows, const std::vector<double>& y) {
  const auto count = static_cast<Eigen::Index>(rows.size());
  const auto columns = rows.empty() ? 0 : static_cast<Eigen::Index>(rows.front().size());
  Table table{Eigen::MatrixXd(count, columns), Eigen::VectorXd(count)};
  for (Eigen::Index i = 0; i < count; ++i) {
    for (Eigen::Index j = 0; j < columns; ++j)
      table.rows(i, j) = rows[static_cast<std::size_t>(i)][static_cast<std::size_t>(j)];
    table.y[i] = y[static_cast<std::size_t>(i)];
  }
  return table;
}

double median(std::vector<double> values) {
  const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
  std::ranges::nth_element(values, middle);
  return *middle;
}

/// Lag-1 correlation, not below zero.
double correlation_of(const Eigen::VectorXd& residual) {
  const auto count = residual.size();
  const double lagged = residual.head(count - 1).dot(residual.tail(count - 1));
  const double all = residual.squaredNorm();
  return all > 0.0 ? std::clamp(lagged / all, 0.0, 0.95) : 0.0;
}

Table without_outliers(const Table& table, const Eigen::VectorXd& residual) {
  std::vector<double> size(static_cast<std::size_t>(residual.size()));
  for (std::size_t i = 0; i < size.size(); ++i) size[i] = std::abs(residual[static_cast<Eigen::Index>(i)]);
  constexpr double robust = 1.4826, far = 5.0;
  const double limit = far * robust * median(size);
  if (!(limit > 0.0)) return table;
  std::vector<Eigen::Index> kept;
  for (Eigen::Index i = 0; i < residual.size(); ++i)
    if (std::abs(residual[i]) <= limit) kept.push_back(i);
  return {table.rows(kept, Eigen::all), table.y(kept)};
}

}  // namespace

std::optional<Regression> regress(const std::vector<std::vector<double>>& rows, const std::vector<double>& y,
                                  Outliers outliers) {
  Table table = table_of(rows, y);
  const Eigen::Index columns = table.rows.cols();
  if (table.rows.rows() < columns + 3) return {};
  if (outliers == Outliers::left_out) {
    const Eigen::VectorXd first = table.rows.colPivHouseholderQr().solve(table.y);
    table = without_outliers(table, table.y - table.rows * first);
  }
  const Eigen::ColPivHouseholderQR<Eigen::MatrixXd> qr(table.rows);
  if (table.rows.rows() < columns + 3 || qr.rank() < columns) return {};
  const Eigen::VectorXd fit = qr.solve(table.y), residual = table.y - table.rows * fit;
  const double rho = correlation_of(residual), inflation = (1.0 + rho) / (1.0 - rho);
  const auto count = static_cast<double>(residual.size());
  Regression r;
  r.loss = residual.squaredNorm();
  r.scatter = std::sqrt(r.loss / (count - static_cast<double>(columns)));
  r.effective = count / inflation;
  const Eigen::MatrixXd covariance = (table.rows.transpose() * table.rows).inverse();
  for (Eigen::Index j = 0; j < columns; ++j) {
    r.coefficient.push_back(fit[j]);
    r.standard_error.push_back(r.scatter * std::sqrt(covariance(j, j) * inflation));
  }
  return r;
}

}  // namespace dutygauge::field
