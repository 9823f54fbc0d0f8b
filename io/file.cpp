#include "io/file.hpp"

#include <fmt/format.h>

#include <array>
#include <cerrno>
#include <cstdio>
#include <memory>
#include <system_error>

namespace panelwright::io {
namespace {

struct Close {
    void operator()(std::FILE* file) const { std::fclose(file); }
};
using File = std::unique_ptr<std::FILE, Close>;

/// `error` is errno, saved right after the call that failed.
FileError failure(const std::filesystem::path& path, std::string_view what, int error) {
    return FileError(
        fmt::format("{}: cannot {}: {}", path.string(), what, std::generic_category().message(error)));
}

}  // namespace

std::string read_file(const std::filesystem::path& path) {
    const File file(std::fopen(path.c_str(), "rb"));
    if (!file) throw failure(path, "open", errno);
    std::string bytes;
    std::array<char, 65536> block;
    while (const std::size_t count = std::fread(block.data(), 1, block.size(), file.get())) {
        bytes.append(block.data(), count);
    }
    if (std::ferror(file.get()) != 0) throw failure(path, "read", errno);
    return bytes;
}

void write_file(const std::filesystem::path& path, std::string_view bytes) {
    File file(std::fopen(path.c_str(), "wb"));
    if (!file) throw failure(path, "create", errno);
    if (std::fwrite(bytes.data(), 1, bytes.size(), file.get()) != bytes.size()) {
        throw failure(path, "write", errno);
    }
    // A full disk may show only now, when the last block leaves the buffer.
    if (std::fclose(file.release()) != 0) throw failure(path, "write", errno);
}

}  // namespace panelwright::io
