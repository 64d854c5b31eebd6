#include <iostream>
#include <string>
#include <vector>

#include "dutygauge/cli.hpp"

int main(int argc, char** argv) {
  return dutygauge::cli::run(std::vector<std::string>(argv + 1, argv + argc), std::cout, std::cerr);
}
