/// Text files line by line, for the readers of Touchstone and CSV.
#pragma once

#include <cstddef>
#include <filesystem>
#include <optional>
#include <string>
#include <string_view>

#include "io/file.hpp"

namespace panelwright::io {

/// The lines of a text in memory, with LF or CR LF ends, with or without a byte order mark.
class TextLines {
  public:
    /// `path` names the file in messages. Throws FileError where it cannot be read.
    explicit TextLines(const std::filesystem::path& path);

    /// The next line without its end; nothing after the last one.
    std::optional<std::string_view> next();

    /// A FileError about the current line: "PATH:LINE: what".
    FileError error(std::string_view what) const;

  private:
    std::string name_;
    std::string text_;
    std::size_t position_ = 0;
    std::size_t line_ = 0;
};

/// `text` without blanks at both ends.
std::string_view trimmed(std::string_view text);

/// The finite number that all of `text` spells, with or without a leading +; nothing for other text.
std::optional<double> finite_number(std::string_view text);

}  // namespace panelwright::io
