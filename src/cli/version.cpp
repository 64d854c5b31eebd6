#include <string>

#include "command.hpp"

namespace dutygauge::cli {

std::string version() {
  return "dutygauge " DUTYGAUGE_VERSION " (" DUTYGAUGE_COMMIT ")\n";
}

}  // namespace dutygauge::cli
