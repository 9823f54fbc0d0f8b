/// Every key of a case file, checked on its own.
#pragma once

#include <cstddef>
#include <map>
#include <set>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

#include "io/case.hpp"
#include "io/case_document.hpp"
#include "io/case_keys.hpp"

namespace panelwright::io {

/// A value that has the right type and lies inside its key's bounds.
struct Checked {
    Position at;                 ///< of the value; of the table where the default stands in
    bool given = false;          ///< false: the default
    double number = 0.0;         ///< in SI units; a metal's conductivity
    std::string text;            ///< as it stands in a file, without quotation marks: "53 mm", "2.2", "brass"
    std::vector<Checked> items;  ///< of a list
};

/// A list of problems that stops growing at a hundred, so that a file of rubbish does not answer with a book.
class ProblemList {
  public:
    void add(Position at, std::string message);
    void add(const std::vector<CaseProblem>& problems);
    bool empty() const { return problems_.empty(); }
    bool full() const;

    /// All problems in the order of the file, with a last one saying so where some were left out.
    std::vector<CaseProblem> sorted() const;

  private:
    std::vector<CaseProblem> problems_;
};

/// What a file says, key by key.
struct Reading {
    std::map<std::string, Checked, std::less<>>
        values;  ///< by path: "patch.length", "post[2].x"; absent ones have none
    std::set<std::string, std::less<>> failed;  ///< paths and tables ("post[2]") with a problem
    std::size_t posts = 0;
    std::size_t vary_blocks = 0;
    std::vector<CaseProblem> problems;  ///< in the order of the file

    const Checked* find(std::string_view path) const;
    /// The number at `path`, which must be there.
    double number(std::string_view path) const;
};

/// Checks every key of `document` on its own: known, present, of the right type, inside its bounds; fills in
/// defaults, but for those that follow from other keys. The keys of [[vary]] are only checked for being
/// known.
Reading read_keys(const Members& document);

/// A good value, or what is wrong with it.
using Outcome = std::variant<Checked, std::vector<CaseProblem>>;

/// Checks `value` as the value of `key`; `path` names it in messages.
Outcome check_value(const Key& key, std::string_view path, const Value& value);

/// Checks the type and the unit of `value` but not its bounds; `key` must be numeric.
Outcome check_number(const Key& key, std::string_view path, const Value& value);

/// "patch.length = \"53 mm\" at 8:10", or "… by default".
std::string named(const Reading& reading, std::string_view path);

/// "8:10"
std::string text(Position at);

}  // namespace panelwright::io
