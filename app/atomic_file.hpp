/// Files that appear whole or not at all.
#pragma once

#include <filesystem>
#include <functional>

namespace panelwright::app {

/// Calls `writer` with a temporary name in the folder of `path`, flushes what it wrote to the disk and
/// renames it to `path`, replacing what stood there. When anything fails the temporary file is removed,
/// `path` is as it was, and the exception goes on; the writer's io::FileError and viz::VtkError as an
/// io::FileError that names `path`.
void commit_file(const std::filesystem::path& path,
                 const std::function<void(const std::filesystem::path&)>& writer);

/// True for a name that `commit_file` gives to temporary files.
bool is_temporary(const std::filesystem::path& path);

}  // namespace panelwright::app
