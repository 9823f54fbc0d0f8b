#include "app/atomic_file.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <unistd.h>

#include <cerrno>
#include <string>
#include <system_error>

#include "io/file.hpp"
#include "viz/vtk_files.hpp"

namespace panelwright::app {
namespace {

constexpr std::string_view suffix = ".panelwright-part";

/// Removes a file at the end of its life unless it was released.
class Temporary {
  public:
    explicit Temporary(const std::filesystem::path& target)
        : path_(target.parent_path() /
                fmt::format(".{}.{}{}", target.filename().string(), getpid(), suffix)) {}
    ~Temporary() {
        std::error_code ignored;  // nothing more can be done about a file that cannot be removed
        if (!path_.empty()) std::filesystem::remove(path_, ignored);
    }
    Temporary(const Temporary&) = delete;
    Temporary& operator=(const Temporary&) = delete;

    const std::filesystem::path& path() const { return path_; }
    void release() { path_.clear(); }

  private:
    std::filesystem::path path_;
};

[[noreturn]] void fail(const std::filesystem::path& path, int error) {
    throw io::FileError(
        fmt::format("{}: cannot be written: {}", path.string(), std::generic_category().message(error)));
}

/// A writer's message with the name of the file that a person knows.
std::string with_name(std::string message, const std::filesystem::path& written,
                      const std::filesystem::path& target) {
    const std::size_t place = message.find(written.string());
    return place == std::string::npos ? message
                                      : message.replace(place, written.string().size(), target.string());
}

/// Waits until the content of the file at `written` is on the disk; `target` is the name for messages.
void flush_to_disk(const std::filesystem::path& written, const std::filesystem::path& target) {
    const int descriptor = open(written.c_str(), O_RDONLY | O_CLOEXEC);
    if (descriptor < 0) fail(target, errno);
    const int error = fsync(descriptor) == 0 ? 0 : errno;
    close(descriptor);
    // EINVAL: a file system that cannot flush single files; it has taken the content all the same.
    if (error != 0 && error != EINVAL) fail(target, error);
}

}  // namespace

void commit_file(const std::filesystem::path& path,
                 const std::function<void(const std::filesystem::path&)>& writer) {
    Temporary temporary(path);
    try {
        writer(temporary.path());
    } catch (const io::FileError& error) {
        throw io::FileError(with_name(error.what(), temporary.path(), path));
    } catch (const viz::VtkError& error) {
        throw io::FileError(with_name(error.what(), temporary.path(), path));
    }
    flush_to_disk(temporary.path(), path);
    std::error_code error;
    std::filesystem::rename(temporary.path(), path, error);
    if (error) fail(path, error.value());
    temporary.release();
}

bool is_temporary(const std::filesystem::path& path) {
    const std::string name = path.filename().string();
    return name.starts_with('.') && name.ends_with(suffix);
}

}  // namespace panelwright::app
