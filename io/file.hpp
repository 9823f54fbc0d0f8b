/// Whole files in and out of memory.
#pragma once

#include <filesystem>
#include <stdexcept>
#include <string>
#include <string_view>

namespace panelwright::io {

/// A file that cannot be written or read; the message names the file.
class FileError : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// All bytes of the file at `path`. Throws FileError with the system's reason.
std::string read_file(const std::filesystem::path& path);

/// Writes `bytes` to exactly `path`, which is created or truncated. Throws FileError with the system's reason
/// (no such folder, disk full, …); what was written up to then stays behind.
void write_file(const std::filesystem::path& path, std::string_view bytes);

}  // namespace panelwright::io
