// Writes the pages of docs/ that come from the program's own tables. Run it after changing a table:
//   write_docs DOCS_FOLDER
#include <exception>
#include <filesystem>
#include <iostream>

#include "io/case.hpp"
#include "io/file.hpp"
#include "io/result_file.hpp"

int main(int argc, char** argv) {
    if (argc != 2) {
        std::cerr << "usage: write_docs DOCS_FOLDER\n";
        return 2;
    }
    try {
        const std::filesystem::path docs = argv[1];
        panelwright::io::write_file(docs / "case-format.md", panelwright::io::case_format_markdown());
        panelwright::io::write_file(docs / "datasets.md", panelwright::io::datasets_markdown());
    } catch (const std::exception& error) {
        std::cerr << error.what() << '\n';
        return 1;
    }
    return 0;
}
