/// Datasets by the rows of the dataset table: shape, units, description and dimension scales come from there.
#pragma once

#include <map>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "io/dataset_table.hpp"
#include "io/hdf5_file.hpp"

namespace panelwright::io {

/// Writes datasets into an image. A dataset that is an axis' scale sets the length of that axis; every other
/// dataset must fit the axes of its row, and gets their scales attached.
class DatasetWriter {
  public:
    explicit DatasetWriter(const hdf5::Image& image) : image_(image) {}

    /// From now on METHOD stands for `method`; axes below /METHOD start afresh.
    void enter(std::string_view method);

    /// Writes the dataset of the row `path`. Returns it, for further attributes. Throws std::invalid_argument
    /// when the number of values does not fit.
    template <typename T>
    hdf5::Handle write(std::string_view path, std::span<const T> values) {
        return write(dataset_entry(path), values);
    }

    /// The same for a row that is not in the table as it stands: a health entry.
    template <typename T>
    hdf5::Handle write(const DatasetEntry& entry, std::span<const T> values);

    /// A scalar.
    template <typename T>
    hdf5::Handle write(std::string_view path, const T& value) {
        return write(path, std::span<const T>(&value, 1));
    }

  private:
    struct Scale {
        hdf5::Handle dataset;
        hsize_t length;
    };

    const hdf5::Image& image_;
    std::string method_;
    std::map<Axis, Scale> scales_;
};

/// Reads datasets from an image and checks type and shape against the table. Reading an axis' scale sets the
/// length of that axis; every other dataset must fit. Throws hdf5::Error naming the dataset.
class DatasetReader {
  public:
    explicit DatasetReader(const hdf5::Image& image) : image_(image) {}

    /// From now on METHOD stands for `method`; axes below /METHOD start afresh.
    void enter(std::string_view method);

    /// True when the dataset or group is there. METHOD is replaced.
    bool has(std::string_view path) const;

    /// All values of the row `path`, C order.
    template <typename T>
    std::vector<T> read(std::string_view path) {
        return read<T>(dataset_entry(path));
    }

    /// The same for a row that is not in the table as it stands: a health entry.
    template <typename T>
    std::vector<T> read(const DatasetEntry& entry);

    /// A scalar.
    template <typename T>
    T read_single(std::string_view path) {
        return read<T>(path).front();
    }

    /// The dataset or group at `path`, for its attributes.
    hdf5::Handle open(std::string_view path) const;

  private:
    const hdf5::Image& image_;
    std::string method_;
    std::map<Axis, hsize_t> lengths_;
};

}  // namespace panelwright::io
