#pragma once

namespace dutygauge::case_io {

/// Height over diameter [-] of the window that has this share of the shell's cross-section.
/// Needs: a share within 0 and 1.
double cut_of_area(double share);

}  // namespace dutygauge::case_io
