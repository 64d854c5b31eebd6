#include "network.hpp"

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace dutygauge::arrangement::network {
namespace {

using Indices = std::vector<int>;

Indices streams_going(const std::vector<bool>& forward, bool way) {
  Indices found;
  for (int i = 0; i < static_cast<int>(forward.size()); ++i)
    if (forward[static_cast<std::size_t>(i)] == way) found.push_back(i);
  return found;
}

/// dT/dx = generator * T over a length of 1.
Matrix generator_of(const std::vector<Stream>& streams, const std::vector<Contact>& contacts) {
  const auto count = static_cast<Eigen::Index>(streams.size());
  Matrix generator = Matrix::Zero(count, count);
  const auto add = [&](int to, int from, double conductance) {
    const Stream& stream = streams[static_cast<std::size_t>(to)];
    const double rate = (stream.forward ? 1.0 : -1.0) * stream.inverse_capacity_rate * conductance;
    generator(to, from) += rate;
    generator(to, to) -= rate;
  };
  for (const Contact& contact : contacts) {
    add(contact.one, contact.other, contact.conductance);
    add(contact.other, contact.one, contact.conductance);
  }
  return generator;
}

/// exp(generator) for a norm below 1/2, where 15 terms leave less than rounding.
Matrix short_exponential(const Matrix& generator) {
  const Matrix one = Matrix::Identity(generator.rows(), generator.cols());
  Matrix sum = one;
  for (int term = 15; term >= 1; --term) sum = one + generator * sum / static_cast<double>(term);
  return sum;
}

/// Of a slice so short that all temperatures along it are nearly those at its left end.
Passage thin_slice(const Matrix& generator, const Indices& f, const Indices& b) {
  const Matrix across = short_exponential(generator);
  const auto count = across.rows();
  if (b.empty()) return {across, Matrix(count, 0), Matrix(0, count), Matrix(0, 0)};
  const Eigen::PartialPivLU<Matrix> back(across(b, b));
  Passage slice;
  slice.backward_backward = back.inverse();
  slice.backward_forward = -back.solve(Matrix(across(b, f)));
  slice.forward_backward = across(f, b) * slice.backward_backward;
  slice.forward_forward = across(f, f) + across(f, b) * slice.backward_forward;
  return slice;
}

/// A uniform temperature passes unchanged: what rounding took from that is given back,
/// or it would double with every doubling of the length.
void rows_to_one(Matrix& same, Matrix& other) {
  const Eigen::ArrayXd sum = same.rowwise().sum().array() + other.rowwise().sum().array();
  same.array().colwise() /= sum;
  other.array().colwise() /= sum;
}

}  // namespace

Passage in_series(const Passage& left, const Passage& right) {
  // What goes forward at the joint has been sent back and forth any number of times.
  const auto forward = left.forward_forward.rows(), backward = left.backward_backward.rows();
  Matrix at_joint(forward, forward + backward);
  at_joint << left.forward_forward, left.forward_backward * right.backward_backward;
  at_joint = (Matrix::Identity(forward, forward) - left.forward_backward * right.backward_forward)
                 .partialPivLu()
                 .solve(at_joint)
                 .eval();
  const auto by_forward = at_joint.leftCols(forward), by_backward = at_joint.rightCols(backward);
  Passage whole;
  whole.forward_forward = right.forward_forward * by_forward;
  whole.forward_backward = right.forward_forward * by_backward + right.forward_backward;
  whole.backward_forward =
      left.backward_forward + left.backward_backward * (right.backward_forward * by_forward);
  whole.backward_backward =
      left.backward_backward * (right.backward_forward * by_backward + right.backward_backward);
  return whole;
}

Matrix in_stream_order(const Passage& passage, const std::vector<bool>& forward) {
  const Indices f = streams_going(forward, true), b = streams_going(forward, false);
  const auto count = static_cast<Eigen::Index>(forward.size());
  Matrix map(count, count);
  map(f, f) = passage.forward_forward;
  map(f, b) = passage.forward_backward;
  map(b, f) = passage.backward_forward;
  map(b, b) = passage.backward_backward;
  return map;
}

Matrix stretch(const std::vector<Stream>& streams, const std::vector<Contact>& contacts) {
  const Matrix generator = generator_of(streams, contacts);
  std::vector<bool> forward;
  for (const Stream& stream : streams) forward.push_back(stream.forward);
  const double norm = generator.cwiseAbs().rowwise().sum().maxCoeff();
  const int doublings = std::max(0, static_cast<int>(std::ceil(std::log2(2.0 * norm + 1e-300))));
  Passage passage = thin_slice(std::ldexp(1.0, -doublings) * generator, streams_going(forward, true),
                               streams_going(forward, false));
  for (int i = 0; i < doublings; ++i) {
    passage = in_series(passage, passage);
    rows_to_one(passage.forward_forward, passage.forward_backward);
    rows_to_one(passage.backward_forward, passage.backward_backward);
  }
  return in_stream_order(passage, forward);
}

double effectiveness(const Network& network, double capacity_ratio) {
  Eigen::Index count = 0;
  for (const Matrix& map : network.stretches) count += map.rows();
  Matrix out_of_in = Matrix::Zero(count, count);
  Eigen::Index at = 0;
  for (const Matrix& map : network.stretches) {
    out_of_in.block(at, at, map.rows(), map.rows()) = map;
    at += map.rows();
  }
  Matrix system = Matrix::Identity(count, count);
  Vector feed = Vector::Zero(count);
  for (const Link& link : network.links) system.row(link.to) -= link.weight * out_of_in.row(link.from);
  for (int inlet : network.shell_inlets) feed(inlet) = 1.0;
  const Vector outlets = out_of_in * system.partialPivLu().solve(feed);
  const auto mixed = [&](const std::vector<End>& ends) {
    double sum = 0.0;
    for (const End& end : ends) sum += end.weight * outlets(end.stream);
    return sum;
  };
  const double p = mixed(network.tube_outlets), shell = mixed(network.shell_outlets);
  if (std::abs(capacity_ratio * p - (1.0 - shell)) > 1e-8)
    throw std::runtime_error("arrangement: the heats of the two streams do not agree");
  return p;
}

}  // namespace dutygauge::arrangement::network
