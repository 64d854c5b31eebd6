#include <doctest/doctest.h>

#include <cmath>

#include "published/published.hpp"

TEST_CASE("published: every published value is met within what its source justifies") {
  const auto rows = published::all();
  REQUIRE(!rows.empty());
  for (const auto& row : rows) {
    CAPTURE(row.source);
    CAPTURE(row.what);
    CAPTURE(row.published);
    CAPTURE(row.ours);
    REQUIRE(std::isfinite(row.ours));
    const double scale = row.relative ? std::abs(row.published) : 1.0;
    CHECK(std::abs(row.ours - row.published) <= row.tolerance * scale);
  }
}
