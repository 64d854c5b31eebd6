#pragma once
#include <iosfwd>
#include <string>
#include <vector>

/// The command line. The program only calls `run`.
namespace dutygauge::cli {

/// Exit statuses; part of the contract with scripts.
enum Status : int {
  done = 0,            ///< done, and the service (if stated) is met
  not_met = 1,         ///< done, but the service is not met or a `must` finding stands
  input_at_fault = 2,  ///< the call or an input is at fault
  no_result = 3,       ///< the calculation could not be completed
  cannot_write = 4,    ///< a result could not be written
  bug = 70,            ///< an error of the program
  interrupted = 130,
};

/// Runs one command: `arguments` without the program's name.
int run(const std::vector<std::string>& arguments, std::ostream& out, std::ostream& err);

}  // namespace dutygauge::cli
