// Writes the sample result to the file named on the command line, for readers in other languages.
#include <iostream>

#include "tests/io/sample_results.hpp"

int main(int argc, char** argv) {
    if (argc != 2) {
        std::cerr << "usage: write_sample_result FILE\n";
        return 2;
    }
    panelwright::io::write_result(argv[1], panelwright::test::sample_result(),
                                  panelwright::test::sample_provenance());
    return 0;
}
