/// Results as HDF5. The layout stands in docs/datasets.md, which comes from the same table as the writer.
#pragma once

#include <filesystem>
#include <string>

#include "io/file.hpp"
#include "solver/result.hpp"

namespace panelwright::io {

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

/// Writes `result` to `path`, which is created or truncated; the caller renames it into place. The same
/// arguments give the same bytes. Throws FileError where the file cannot be written, and
/// std::invalid_argument where the parts of the result do not fit together: a method twice, methods with
/// different bands, patterns of one method on different grids, an array of another length than its axis.
void write_result(const std::filesystem::path& path, const solver::Result& result,
                  const Provenance& provenance);

/// A result read back.
struct StoredResult {
    solver::Result result;
    Provenance provenance;
};

/// Reads a file made by `write_result`; every number comes back to the last digit. Throws FileError naming
/// what is wrong: no HDF5 file, truncated, of another program or a newer layout, a dataset missing or
/// misshapen. Single bytes that changed on the disk are not caught: the format has no checksums, and the HDF5
/// library trusts it.
StoredResult read_result(const std::filesystem::path& path);

/// docs/datasets.md, whole.
std::string datasets_markdown();

}  // namespace panelwright::io
