#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/units.hpp"

/// What the text page is set with: lines, columns and figures.
namespace dutygauge::report {

inline constexpr std::size_t page_width = 100;

/// The text in ASCII: common letters and signs spelled out, others as '?'; line
/// breaks and other control characters become blanks.
std::string ascii(std::string_view utf8);

/// `text` cut to `width` columns, with "..." where something was cut.
std::string clipped(std::string text, std::size_t width);

enum class Align { left, right };

/// A page under construction. Every line is ASCII and fits the page.
class Page {
 public:
  void blank();
  /// One line as it stands; what passes the page width goes to the next line.
  void line(std::string_view text);
  /// Words wrapped behind `lead`; the following lines are indented by its width.
  void paragraph(std::string_view lead, std::string_view text);
  /// A paragraph behind a section's name. Continue it with an empty name.
  void section(std::string_view name, std::string_view text);
  /// Columns two blanks apart, `indent` blanks in; the last column is wrapped in its place.
  void table(const std::vector<std::vector<std::string>>& rows, const std::vector<Align>& columns,
             std::size_t indent = 2);
  const std::string& text() const { return text_; }

 private:
  std::string text_;
};

/// Numbers as the page shows them, in one system of units.
class Figures {
 public:
  explicit Figures(units::System system) : system_(system) {}
  /// Temperatures with one decimal, everything else with `significant` digits.
  std::string number(double si, units::Kind kind, int significant = 4) const;
  std::string unit(units::Kind kind) const;
  /// Lengths from one metre up are in m or ft, however small the unit of the table is.
  std::string with_unit(double si, units::Kind kind, int significant = 4) const;
  /// A temperature difference with its sign and unit.
  std::string difference(double kelvin) const;

 private:
  units::System system_;
};

/// A fraction in per cent with its sign: "+18.0 %".
std::string signed_percent(double fraction);

}  // namespace dutygauge::report
