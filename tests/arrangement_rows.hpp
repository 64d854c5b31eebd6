#pragma once
#include <cmath>
#include <optional>
#include <string>

#include "dutygauge/arrangement.hpp"
#include "support.hpp"

/// Rows of the P-NTU tables as arrangements seen from the tube side.
namespace arrangement_rows {

using namespace dutygauge::arrangement;

/// An arrangement by the name the tables give it.
inline Arrangement named(const std::string& name, int passes, int shells) {
  Arrangement a{.tube_passes = passes, .shells_in_series = shells};
  if (name == "parallel")
    a.flow = Flow::parallel;
  else if (name == "E_odd_parallel")
    a.first_tube_pass = FirstTubePass::with_shell_flow;
  else if (name != "counterflow")
    a.shell_type = name[0];
  if (name.find("crossparallel") != std::string::npos) a.flow = Flow::parallel;
  if (name.find("shellmixed") != std::string::npos) a.mixing = Mixing::shell_stream;
  if (name.find("_unmixed") != std::string::npos) a.mixing = Mixing::nowhere;
  return a;
}

struct Point {
  Arrangement arrangement;
  double r, ntu, p;
  std::optional<double> f;
  double p_scale;  ///< P of the table's side over ours
};

inline Point point_of(const support::CsvRow& row) {
  const auto number = [&](const char* column) { return std::stod(row.at(column)); };
  Point point{.arrangement = named(row.at("arrangement"), std::stoi(row.at("tube_passes")),
                                   std::stoi(row.at("shells_in_series"))),
              .r = number("R"),
              .ntu = number("NTU"),
              .p = number("P"),
              .f = {},
              .p_scale = 1.0};
  if (!row.at("F").empty()) point.f = number("F");
  if (row.at("reference_side") == "shell") {
    point.p *= point.r, point.ntu *= point.r, point.p_scale = 1.0 / point.r;
    point.r = 1.0 / point.r;
  }
  return point;
}

/// F from P and R as a designer forms it: the NTU of counterflow over our own.
inline double f_at(const Arrangement& arrangement, double r, double p) {
  const auto counterflow = counterflow_ntu(r, p), ntu = ntu_for(arrangement, r, p);
  return counterflow && ntu ? *counterflow / *ntu : std::nan("");
}

/// Our value of a row of the printed ones. F rows give the temperatures and name the cold
/// stream as reference: it is in the tubes, or the arrangement does not care.
inline double ours_of_printed(const support::CsvRow& row) {
  const auto number = [&](const char* column) { return std::stod(row.at(column)); };
  const Arrangement a =
      named(row.at("arrangement"), std::stoi(row.at("tube_passes")), std::stoi(row.at("shells_in_series")));
  if (row.at("quantity") == "P") return effectiveness(a, number("R"), number("NTU"));
  const double hot_in = number("T_hot_in_degC"), cold_in = number("T_cold_in_degC");
  const double rise = number("T_cold_out_degC") - cold_in;
  return f_at(a, (hot_in - number("T_hot_out_degC")) / rise, rise / (hot_in - cold_in));
}

}  // namespace arrangement_rows
