#pragma once
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/findings.hpp"
#include "dutygauge/service.hpp"

/// What a sheet claims, audited: against itself, against the drawing, against our rating.
namespace dutygauge::bids {

/// A number as the sheet prints it.
struct Stated {
  double value = 0;     ///< SI
  double rounding = 0;  ///< half a unit of the last printed digit, SI, as a difference
};

/// What an area stands for.
enum class Per { unit, shell };

/// What a surface margin rests on.
enum class MarginBasis { unstated, clean, design_fouling };

/// The claims of a sheet, as built. Areas and U are on the outside surface.
struct Claims {
  std::optional<Stated> duty;                                 ///< [W]
  std::optional<Stated> shell_side_outlet, tube_side_outlet;  ///< [K]
  std::optional<Stated> area_effective, area_gross;           ///< [m2]
  Per area_per = Per::unit;                                   ///< of both
  std::optional<Stated> u_service;                            ///< duty / (area x mtd) [W/m2.K]
  std::optional<Stated> u_dirty, u_clean;                     ///< with and without fouling [W/m2.K]
  std::optional<Stated> lmtd, f_correction, mtd;              ///< [K], [-], [K]
  std::optional<Stated> tube_side_velocity;                   ///< [m/s]
  std::optional<Stated> shell_side_pressure_drop;             ///< [Pa]
  std::optional<Stated> tube_side_pressure_drop;              ///< [Pa]
  std::optional<Stated> tube_side_film, shell_side_film;      ///< [W/m2.K]
  std::optional<Stated> tube_count;                           ///< of one shell
  std::optional<Stated> nozzle_rho_v2;                        ///< of the nozzle that has most [kg/m.s2]
  std::optional<Stated> surface_margin;                       ///< [-]
  MarginBasis surface_margin_basis = MarginBasis::unstated;
  std::optional<Stated> weight;  ///< [kg]
  std::string operating_case;    ///< the case they speak of; empty: base
};

/// One claim: its key below `claims`, its place and what kind of number it is.
struct ClaimKey {
  std::string_view key;
  std::optional<Stated> Claims::*place;
  units::Kind kind;
};

/// All of them, in the order in which verdicts come.
std::span<const ClaimKey> claim_keys();

enum class Agreement {
  agrees,       ///< within rounding and 1 %, or within the scatter of a method
  ask,          ///< worth a question: a method's difference, or a small one of the heat balance
  contradicts,  ///< by arithmetic or geometry the sheet cannot be right
  not_checked,
};

struct ClaimVerdict {
  std::string key;                 ///< below `claims` ("area.effective")
  double stated = 0;               ///< SI
  std::optional<double> computed;  ///< SI; empty where not checked
  units::Kind kind = units::Kind::ratio;
  std::optional<double> ratio;  ///< stated / computed; outlets: of their heats, margins: of the surfaces
  Ground ground = Ground::arithmetic;
  Agreement verdict = Agreement::not_checked;
  std::string against;      ///< what `computed` is
  std::string likely = {};  ///< cause of a difference, or why it was not checked
  std::string source = {};  ///< key in sources.hpp, of a method's scatter
};

/// One verdict for every claim stated. `as_built` is the rating of the case the sheet speaks
/// of, without what has changed since.
///
/// A wrong number is blamed once: where it was found to contradict, what rests on it is held
/// against both the number stated and the one computed in its place. Between duty and the two
/// outlets the odd one out is blamed. `u_service` is held against the sheet's own numbers
/// alone, never against our U.
///
/// Tolerances: half a unit of each printed digit, carried through, and 1 %. Heat balance:
/// to 5 % a question. Our films 25 %, shell-side drop 40 %, tube-side drop 20 %.
std::vector<ClaimVerdict> audit(const Claims& claims, const service::Assessment& as_built);

/// Contradictions as findings `claims.contradicts`, severity should.
Findings findings_of(const std::vector<ClaimVerdict>& verdicts);

}  // namespace dutygauge::bids
