#include "dutygauge/field/laws.hpp"

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace dutygauge::field {

std::string_view name_of(LawKind kind) {
  switch (kind) {
    case LawKind::constant:
      return "no trend";
    case LawKind::linear:
      return "linear";
    case LawKind::root_time:
      return "root of time";
    case LawKind::falling:
      return "falling rate";
    case LawKind::asymptotic:
      return "asymptotic";
  }
  throw std::logic_error("field: a law without a name");
}

int parameters_of(LawKind kind) {
  if (kind == LawKind::constant) return 1;
  return kind == LawKind::linear || kind == LawKind::root_time ? 2 : 3;
}

double growth(LawKind kind, double shape, double t) {
  switch (kind) {
    case LawKind::constant:
      return 0.0;
    case LawKind::linear:
      return t;
    case LawKind::root_time:
      return std::sqrt(std::max(t, 0.0));
    case LawKind::falling: {
      const double x = std::max(t, 0.0) / shape;
      return x / (std::sqrt(1.0 + x) + 1.0);  // sqrt(1+x) - 1 without cancellation
    }
    case LawKind::asymptotic:
      return -std::expm1(-std::max(t, 0.0) / shape);
  }
  throw std::logic_error("field: a law without a growth");
}

double Law::at(double time) const {
  return r0 + rise * growth(kind, shape, time - origin);
}

double Law::rate_at(double time) const {
  const double t = time - origin;
  switch (kind) {
    case LawKind::constant:
      return 0.0;
    case LawKind::linear:
      return rise;
    case LawKind::root_time:
      return t > 0.0 ? 0.5 * rise / std::sqrt(t) : 0.0;
    case LawKind::falling:
      return t >= 0.0 ? 0.5 * rise / (shape * std::sqrt(1.0 + t / shape)) : 0.0;
    case LawKind::asymptotic:
      return t >= 0.0 ? rise / shape * std::exp(-t / shape) : 0.0;
  }
  throw std::logic_error("field: a law without a rate");
}

std::optional<double> Law::reaches(double level) const {
  if (r0 >= level) return origin;
  if (!(rise > 0.0) || kind == LawKind::constant) return {};
  const double g = (level - r0) / rise;
  switch (kind) {
    case LawKind::linear:
      return origin + g;
    case LawKind::root_time:
      return origin + g * g;
    case LawKind::falling:
      return origin + shape * g * (g + 2.0);
    default:
      return g < 1.0 ? std::optional(origin - shape * std::log1p(-g)) : std::nullopt;
  }
}

double slope_error(double scatter, double n, double correlation) {
  return scatter * std::sqrt(12.0 / (n * (n * n - 1.0))) *
         std::sqrt((1.0 + correlation) / (1.0 - correlation));
}

bool asymptote_identified(const Fit& fit, double record) {
  return fit.law.kind == LawKind::asymptotic && fit.law.shape < record &&
         fit.standard_error[1] < 0.3 * std::abs(fit.law.rise);
}

}  // namespace dutygauge::field
