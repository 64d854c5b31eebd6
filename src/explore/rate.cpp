#include <algorithm>
#include <filesystem>

#include "dutygauge/explore.hpp"
#include "how_sure.hpp"

namespace dutygauge::explore {

service::Assessment assess_both_ways(const rating::Problem& problem, const service::Service& service) {
  service::Assessment assessment = service::assess(problem, service);
  const Findings more = rating::compare_solutions(problem, assessment.rating);
  assessment.findings.insert(assessment.findings.end(), more.begin(), more.end());
  return assessment;
}

report::Result rate(const case_io::Case& a_case) {
  service::Service service = a_case.service;
  service.words = a_case.display;
  report::Result result{.file = std::filesystem::path(a_case.file).filename().string(),
                        .title = a_case.title,
                        .tag = a_case.tag,
                        .input_sha256 = a_case.sha256,
                        .display = a_case.display,
                        .assessment = assess_both_ways(a_case.problem, service),
                        .inputs = a_case.inputs,
                        .assumed = a_case.assumed,
                        .findings = a_case.findings};
  const service::Assessment* const assessed[] = {&result.assessment};
  result.spread = how_sure(assessed).front();
  qualify(result.assessment, result.spread);
  const auto& judged = result.assessment.findings;
  result.findings.insert(result.findings.end(), judged.begin(), judged.end());
  result.claims = bids::audit(a_case.claims, result.assessment);
  const auto contradictions = bids::findings_of(result.claims);
  result.findings.insert(result.findings.end(), contradictions.begin(), contradictions.end());
  std::ranges::stable_sort(result.findings, std::ranges::greater{}, &Finding::severity);
  return result;
}

}  // namespace dutygauge::explore
