#include <fmt/core.h>

#include <cmath>

#include "field_drawing.hpp"
#include "field_words.hpp"

namespace dutygauge::report {
namespace {

using field::FieldResult;

// Blue and vermilion of Okabe & Ito keep apart without red and green, and in grey; so do the dashes.
constexpr std::string_view style = R"css(
:root{color-scheme:light dark;--ink:#1b1b1b;--paper:#fff;--quiet:#666;--grid:#d9d9d9;--range:#9cc3dc;--days:#0072b2;--law:#b34700}
@media (prefers-color-scheme:dark){:root{--ink:#eee;--paper:#161616;--quiet:#aaa;--grid:#3a3a3a;--range:#2f5c78;--days:#6ec3f5;--law:#ff9a57}}
body{font:16px/1.5 system-ui,sans-serif;color:var(--ink);background:var(--paper);max-width:62rem;margin:0 auto;padding:1rem}
h1{font-size:1.3rem;margin:0}h2{font-size:.95rem;margin:1.4rem 0 .2rem;border-bottom:1px solid var(--grid)}
p,ol{margin:.2rem 0}.quiet{color:var(--quiet)}.answer{font-size:1.25rem;font-weight:600}
figure{margin:1rem 0}svg{width:100%;height:auto;touch-action:none}svg text{font:12px system-ui,sans-serif;fill:var(--ink)}
.grid{stroke:var(--grid);fill:none}.range{stroke:var(--range);stroke-width:1.6;fill:none}.days{stroke:var(--days);stroke-width:1.6;fill:none}
.law{stroke:var(--law);stroke-width:2;stroke-dasharray:8 4;fill:none}.allowed{stroke:var(--ink);stroke-width:1.5;stroke-dasharray:2 3;fill:none}
.event{stroke:var(--quiet);stroke-dasharray:1 3;fill:none}.chosen{fill:var(--days);opacity:.2}
table{border-collapse:collapse;font-variant-numeric:tabular-nums}th,td{text-align:left;padding:.1rem .9rem .1rem 0;border-bottom:1px solid var(--grid)}
@media print{:root{--ink:#000;--paper:#fff;--quiet:#444;--grid:#ccc;--range:#aaa;--days:#000;--law:#000}#trend,#days{display:none}}
)css";

std::string paragraph(std::string_view text, std::string_view kind = "") {
  return kind.empty() ? fmt::format("<p>{}</p>\n", escaped(text))
                      : fmt::format("<p class=\"{}\">{}</p>\n", kind, escaped(text));
}

std::string heading(std::string_view text) {
  return fmt::format("<h2>{}</h2>\n", escaped(text));
}

std::string list(const std::vector<std::string>& lines) {
  std::string html = "<ol>";
  for (const std::string& line : lines) html += fmt::format("<li>{}</li>", escaped(line));
  return html + "</ol>\n";
}

std::string table(const Rows& rows) {
  std::string html = "<table>";
  for (std::size_t i = 0; i < rows.size(); ++i) {
    html += "<tr>";
    for (const std::string& cell : rows[i])
      html += i == 0 ? fmt::format("<th scope=\"col\">{}</th>", escaped(cell))
                     : fmt::format("<td>{}</td>", escaped(cell));
    html += "</tr>";
  }
  return html + "</table>\n";
}

std::string head(const CaseName& about, const FieldResult& result) {
  const std::string name = about.tag.empty() ? about.file : about.tag;
  std::string html =
      "<!doctype html>\n<html lang=\"en\"><head><meta charset=\"utf-8\">\n"
      "<meta name=\"viewport\" content=\"width=device-width,initial-scale=1\">\n"
      "<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'; "
      "script-src 'unsafe-inline'\">\n";
  html += fmt::format("<title>{}: fouling</title>\n<style>{}</style></head><body>\n", escaped(name), style);
  html += fmt::format("<header><h1>{}{}</h1>\n", escaped(name),
                      about.title.empty() ? "" : "  " + escaped(about.title));
  std::string period;
  if (!result.days.empty())
    period = fmt::format("Readings {} to {}. ", iso_date(result.start, result.days.front().day),
                         iso_date(result.start, result.days.back().day));
  return html +
         paragraph(fmt::format("{}{} rows, {} used. Input {}.", period, result.rows.read, result.rows.used,
                               about.input_sha256.substr(0, 8)),
                   "quiet") +
         "</header><main>\n";
}

std::string trend(const CaseName& about, const FieldResult& result) {
  const std::string drawing = trend_svg(about, result);
  if (drawing.empty()) return "";
  const bool ranges = !result.ranges.empty();
  return heading("TREND") + "<figure>" + drawing + "<figcaption class=\"quiet\">" +
         (ranges ? "Bars: least to greatest reading of a day. "
                 : "Bars: two standard deviations of the day's readings either side. ") +
         "Solid: median. Dashed: law since the last cleaning, carried on. Dotted: allowed. Numbers: "
         "events.</figcaption></figure>\n"
         "<div id=\"trend\" hidden><p>Closer: drag over some days; twice or Esc for all; keys + - and "
         "arrows. "
         "<button type=\"button\" id=\"trend-all\">All days</button> <span id=\"trend-said\" "
         "aria-live=\"polite\"></span></p>"
         "<svg viewBox=\"0 0 960 360\" tabindex=\"0\" role=\"img\" aria-label=\"The same trend, to be looked "
         "at closer\"></svg></div>\n"
         "<script type=\"application/json\" id=\"trend-data\">" +
         trend_data(about, result) + "</script>\n<script>" + std::string(trend_script) + "</script>\n";
}

std::string days_table(const CaseName& about, const FieldResult& result) {
  if (result.days.empty()) return "";
  std::string html = fmt::format(
      "<details id=\"days\"><summary>Every day as a table</summary><table><caption>Daily medians</caption>"
      "<tr><th scope=\"col\">day</th><th scope=\"col\">readings</th><th scope=\"col\">fouling, {}</th>"
      "<th scope=\"col\">heat balance</th></tr>\n",
      escaped(resistance_unit(about.display)));
  for (const field::Day& day : result.days) {
    const auto& a = day.apparent;
    html +=
        fmt::format("<tr><th scope=\"row\">{}</th><td>{}</td><td>{}</td><td>{}</td></tr>\n",
                    iso_date(result.start, day.day), day.count,
                    std::isfinite(a.fouling) ? resistance(a.fouling, about.display) : "not known",
                    std::isfinite(a.closure) ? fmt::format("{:+.1f} %", 100.0 * a.closure) : "not tested");
  }
  return html + "</table></details>\n";
}

}  // namespace

std::string html(const CaseName& about, const FieldResult& result) {
  std::string page = head(about, result);
  for (const Fact& said : facts_of(about, result)) {
    page += heading(said.name);
    if (said.name == "EVENTS")
      page += list(said.lines);
    else
      for (const std::string& line : said.lines)
        page += paragraph(line, said.name == "ANSWER" ? "answer" : "");
    if (said.name == "ANSWER") page += trend(about, result);
  }
  if (const Rows rows = hypotheses_table(about, result); !rows.empty())
    page += heading("SAME EITHER WAY?") + table(rows);
  if (const Rows rows = options_table(result); !rows.empty()) page += heading("WAYS TO GO ON") + table(rows);
  if (const auto tasks = next_of(result); !tasks.empty()) page += heading("NEXT") + list(tasks);
  page += paragraph("Never open or isolate on this result alone.") + days_table(about, result) +
          "</main>\n<footer>" +
          paragraph(
              "Engineering aid, not a code calculation; defer to local codes and licensed practice. "
              "dutygauge " DUTYGAUGE_VERSION,
              "quiet");
  return page + "</footer></body></html>\n";
}

}  // namespace dutygauge::report
