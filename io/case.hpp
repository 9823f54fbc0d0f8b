/// A case file: reading, checking and describing it.
#pragma once

#include <cstddef>
#include <filesystem>
#include <span>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

#include "mesh/panel.hpp"
#include "solver/solution.hpp"

namespace panelwright::io {

/// One block of variations: `keys` move together through `values`.
struct Variation {
    std::vector<std::string> keys;    ///< "reflector.length", …
    std::vector<std::string> values;  ///< (V) as text with unit, in file order: "160 mm"
};

/// A checked case in SI units; made only by `read_case` and `parse_case`.
struct Case {
    std::string title;
    mesh::Panel panel;
    solver::Task task;  ///< band, pattern frequencies, accuracy, reference impedance
    std::vector<solver::Method> methods;
    std::vector<Variation> variations;
    std::string file;      ///< name as given
    std::string text;      ///< the file, verbatim
    std::string resolved;  ///< all keys with all defaults filled in, as TOML
};

/// One problem of a case file.
struct CaseProblem {
    std::size_t line = 0;    ///< from 1
    std::size_t column = 0;  ///< from 1
    std::string message;     ///< what was found, what is allowed
};

/// All problems of a case file together. `what()` is one line a problem: FILE:LINE:COLUMN: message.
class CaseError : public std::runtime_error {
  public:
    CaseError(std::string file, std::vector<CaseProblem> problems);
    const std::vector<CaseProblem>& problems() const { return problems_; }
    const std::string& file() const { return file_; }

  private:
    std::string file_;
    std::vector<CaseProblem> problems_;
};

/// Largest case file that is read [bytes].
inline constexpr std::size_t largest_case_file = 1U << 20U;

/// Reads and checks a case file. Throws CaseError.
Case read_case(const std::filesystem::path& path);

/// Reads and checks a case from memory; `file` names it in messages. Throws CaseError.
Case parse_case(std::string_view text, std::string_view file);

/// One row of the key table: it drives parsing, bounds, defaults, suggestions, `panelwright keys` and the
/// docs.
struct KeyEntry {
    std::string name;           ///< "patch.length"
    std::string type;           ///< "length", "frequency", "number", "text", …
    std::string unit;           ///< units that are accepted: "mm, cm, m, in, mil"
    std::string default_value;  ///< as it would stand in a file; "required" where there is none
    std::string bounds;         ///< what is allowed, in words or as a range
    std::string description;    ///< one sentence
};

/// All keys, in the order of the documentation.
std::span<const KeyEntry> key_table();

/// docs/case-format.md, whole.
std::string case_format_markdown();

/// The case of one design of a study: `base` with one value of every variation set. `index` counts from 0 to
/// `design_count(base)` - 1, the last block fastest. Throws CaseError when the design breaks a rule.
Case design(const Case& base, std::size_t index);

/// Number of designs of the grid of variations; 1 where there are none.
std::size_t design_count(const Case& base);

/// The varied keys and their values (as text) of design `index`.
std::vector<std::pair<std::string, std::string>> design_values(const Case& base, std::size_t index);

/// SHA-256 of `text` in lower-case hexadecimal.
std::string sha256(std::string_view text);

}  // namespace panelwright::io
