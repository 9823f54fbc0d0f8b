/// A thin layer over the HDF5 C library: identifiers that close themselves, exceptions, and files that live
/// in memory.
///
/// HDF5 never touches the disk here. A file is built in memory and written in one go by `write_file`, and
/// read in one go before HDF5 opens it. So no file stays open, no file is locked (network disks and read-only
/// folders give no trouble), and a full disk is reported by the system's own words.
#pragma once

#include <hdf5.h>

#include <complex>
#include <cstdint>
#include <span>
#include <stdexcept>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace panelwright::io::hdf5 {

/// A call of the library that failed, or a file that is not as it should be. The message does not name the
/// file.
class Error : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// Keeps the library from printing its error stack, for the current thread, while it lives.
class Quiet {
  public:
    Quiet();
    ~Quiet();
    Quiet(const Quiet&) = delete;
    Quiet& operator=(const Quiet&) = delete;

  private:
    H5E_auto2_t print_ = nullptr;
    void* print_data_ = nullptr;
};

/// An identifier of the library; closes itself.
class Handle {
  public:
    using Close = herr_t (*)(hid_t);

    Handle() = default;
    /// Owns `id`. Throws Error with `what` where `id` is none.
    Handle(hid_t id, Close close, std::string_view what);
    ~Handle() { reset(); }
    Handle(Handle&& other) noexcept : id_(std::exchange(other.id_, H5I_INVALID_HID)), close_(other.close_) {}
    Handle& operator=(Handle&& other) noexcept;

    hid_t id() const { return id_; }

  private:
    void reset() noexcept;

    hid_t id_ = H5I_INVALID_HID;
    Close close_ = nullptr;
};

/// An HDF5 file in memory. Objects of format 1.6 and 1.8 only, superblock 0: readers built on HDF5 1.8 can
/// open it.
class Image {
  public:
    /// A new, empty file.
    Image();
    /// Opens the file that consists of `bytes`, for reading. Throws Error where that is no sound HDF5 file.
    explicit Image(const std::string& bytes);
    Image(const Image&) = delete;  // its address is its name within the library
    Image& operator=(const Image&) = delete;

    /// The file as it would stand on disk.
    std::string bytes() const;

    hid_t id() const { return file_.id(); }
    /// Size of the bytes it was opened from; 0 for a new file.
    std::size_t size() const { return size_; }

  private:
    Handle file_;
    std::size_t size_ = 0;
};

/// Sizes along the dimensions of a dataset, slowest first; empty = a scalar.
using Extents = std::vector<hsize_t>;

// T below is double, std::complex<double> (in the file a compound {r, i}), std::int32_t or std::string
// (UTF-8, variable length, without NUL).

/// Creates the dataset at `path` with the groups above it, C order; no extents = a scalar. Returns the
/// dataset. Throws std::invalid_argument when a string contains NUL or the number of values does not fit the
/// extents.
template <typename T>
Handle write_dataset(hid_t file, const std::string& path, const Extents& extents, std::span<const T> values);

/// The dataset or group at `path`; throws Error "PATH is missing" where there is none.
Handle open_object(hid_t file, const std::string& path);

/// True when every link of `path` exists.
bool exists(hid_t file, const std::string& path);

/// Extents of a dataset; empty for a scalar. Throws Error on a group.
Extents extents(hid_t dataset);

/// All values of a dataset that holds elements of type T. `size_limit` [bytes] is that of the file: what
/// claims to hold more is damaged. Throws Error on another type.
template <typename T>
std::vector<T> read_dataset(hid_t dataset, std::size_t size_limit);

/// Attributes; `write_attribute` creates, the readers throw Error where there is none of that name and type.
void write_attribute(hid_t object, const char* name, const std::string& text);
void write_attribute(hid_t object, const char* name, std::int32_t number);
void write_attribute(hid_t object, const char* name, std::span<const double> numbers);
void write_attribute(hid_t object, const char* name, std::span<const std::string> texts);
std::string text_attribute(hid_t object, const char* name);
std::int32_t integer_attribute(hid_t object, const char* name);
std::vector<double> real_attribute(hid_t object, const char* name);
std::vector<std::string> texts_attribute(hid_t object, const char* name);

/// Makes `dataset` a dimension scale called `name`.
void make_scale(hid_t dataset, const std::string& name);

/// Attaches `scale` to dimension `dimension` of `dataset` and labels the dimension `name`.
void attach_scale(hid_t dataset, hid_t scale, unsigned dimension, const std::string& name);

/// Labels dimension `dimension` of `dataset`.
void label(hid_t dataset, unsigned dimension, const std::string& name);

}  // namespace panelwright::io::hdf5
