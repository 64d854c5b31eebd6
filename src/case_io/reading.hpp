#pragma once
#include <map>
#include <optional>
#include <set>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/case_io.hpp"
#include "dutygauge/findings.hpp"
#include "fields.hpp"

/// One document against one field table: values by key, and every mistake.
namespace dutygauge::case_io {

/// A leaf that could be read.
struct Entry {
  const Field* field = nullptr;
  std::string text{};  ///< as typed; the value of words and texts
  int line = 0;
  double factor = 1.0;     ///< already in `value` and shown in `text`
  units::Value value{};    ///< of numbers; the first of a pair; the amount of a flow
  double second = 0;       ///< of a pair
  units::Value outlet{};   ///< the same as written, with its range or deviation
  bool from_duty = false;  ///< a flow that a duty and an outlet give
  units::FlowBasis basis = units::FlowBasis::mass;
  double at_temperature = 0;  ///< [K] where a volume flow is measured, or a property holds
  bool relative = false;      ///< an uncertainty that is a share of the reading
  std::string currency{};     ///< of money: "EUR"; its amount is in `value`, for an energy of a joule
  bool dynamic = false;       ///< a viscosity that may be either: dynamic, not kinematic

  bool is_word() const;
  units::Kind kind() const;  ///< of `value`: a flow's depends on what was written
};
using Entries = std::map<std::string, Entry, std::less<>>;

/// SI value of a key, if it was read.
std::optional<double> si(const Entries& entries, std::string_view key);
std::optional<int> whole(const Entries& entries, std::string_view key);
std::optional<std::string_view> word(const Entries& entries, std::string_view key);

class Reading {
 public:
  /// Checks the keys, reads the leaves, misses what is required.
  Reading(const Document& document, const FieldTable& table);

  const Document& document() const { return document_; }
  const FieldTable& table() const { return table_; }
  const Entries& entries() const { return entries_; }

  /// Whether the file has the key, as a value or a block; what is written `unknown` it has not.
  bool has(std::string_view key) const;

  /// Keys written `unknown`.
  const std::set<std::string, std::less<>>& unknown() const { return unknown_; }

  /// Puts the value found in the place of a word such as from_duty.
  void settle(const std::string& key, double si) { entries_.at(key).value.si = si; }

  /// Whether anything stands in the block of that key.
  bool has_below(std::string_view key) const;

  /// Whether a mistake of this very key is noted.
  bool is_at_fault(std::string_view key) const { return at_fault_.contains(key); }

  /// Notes a mistake where the key stands, else where the nearest block above it stands.
  void note(const std::string& key, const std::string& what, const std::string& expected,
            const std::string& remedy);

  /// Notes what another module objects to, once a key.
  void note_all(const Objections& objections);

  void assume(Assumption assumption) { assumed_.push_back(std::move(assumption)); }

  const Assumptions& assumed() const { return assumed_; }
  const std::vector<Mistake>& mistakes() const { return mistakes_; }

 private:
  /// Whether a mistake of the key, or of an item of its list, is noted.
  bool is_at_fault_within(std::string_view key) const;
  /// Whether the key, or a block it stands in, is there under a misspelt name.
  bool is_misspelt(std::string_view key) const;
  std::string expected_in(const Field& field) const;
  void check_keys();
  void check_key(const std::string& key, const Position& at, bool is_block, bool is_list);
  bool is_refused(std::string_view key) const;
  void refuse(const std::string& key, const Position& at, std::string what, std::string expected,
              std::string remedy);
  void refuse_unknown(const std::string& key, const Position& at);
  void refuse_shape(const std::string& key, const Position& at, const Field& field, bool is_block,
                    bool is_list);
  void read_leaves();
  void read_leaf(const std::string& key, const Leaf& leaf, const Field& field);
  void take(const std::string& key, Entry entry);
  void assume_spans(const std::string& key, const Entry& entry);
  void assume_span(const std::string& key, const Entry& entry, const units::Value& value);
  void require_all();
  void require(const Field& field, const std::string& parent);
  Position position_of(std::string_view key) const;

  const Document& document_;
  const FieldTable& table_;
  Entries entries_;
  Assumptions assumed_;
  std::vector<Mistake> mistakes_;
  std::set<std::string, std::less<>> at_fault_;
  std::set<std::string, std::less<>> unknown_;
  std::set<std::string, std::less<>> refused_;    ///< keys, with all below them
  std::set<std::string, std::less<>> suggested_;  ///< meant by a misspelt key
};

}  // namespace dutygauge::case_io
