/// Results as HDF5.
#pragma once

#include <filesystem>
#include <stdexcept>
#include <string>

#include "solver/result.hpp"

namespace panelwright::io {

/// A file that cannot be written or read; the message names the file.
class FileError : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// Where and how a result was made.
struct Provenance {
    std::string version;      ///< of the program
    std::string commit;       ///< of the source, with "-dirty" where it had uncommitted changes
    std::string created_utc;  ///< ISO 8601
    std::string host;
    int threads = 1;
};

/// Version of the HDF5 layout.
inline constexpr int result_format_version = 1;

/// Writes `result` to `path`, which is created or truncated; the caller renames it into place. Throws FileError.
void write_result(const std::filesystem::path& path, const solver::Result& result, const Provenance& provenance);

/// A result read back.
struct StoredResult {
    solver::Result result;
    Provenance provenance;
};

/// Reads a file made by `write_result`. Throws FileError naming the dataset that is missing or misshapen.
StoredResult read_result(const std::filesystem::path& path);

/// docs/datasets.md, whole.
std::string datasets_markdown();

}  // namespace panelwright::io
