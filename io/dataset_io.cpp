#include "io/dataset_io.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <optional>
#include <stdexcept>

namespace panelwright::io {
namespace {

bool is_scale(const DatasetEntry& entry) {
    return entry.shape.size() == 1 && axis_entry(entry.shape.front()).scale == entry.path;
}

/// Length of an axis that has the same in every file.
std::optional<hsize_t> fixed_length(Axis axis) {
    switch (axis) {
        case Axis::corner:
        case Axis::xyz:
            return 3;
        case Axis::end:
            return 2;
        default:
            return std::nullopt;
    }
}

bool belongs_to_method(Axis axis) {
    return axis_entry(axis).scale.starts_with("/METHOD");
}

}  // namespace

void DatasetWriter::enter(std::string_view method) {
    method_ = method;
    std::erase_if(scales_, [](const auto& item) { return belongs_to_method(item.first); });
}

template <typename T>
hdf5::Handle DatasetWriter::write(const DatasetEntry& entry, std::span<const T> values) {
    const std::string path = with_method(entry.path, method_);
    const bool scale = is_scale(entry);
    hdf5::Extents extents;
    for (const Axis axis : entry.shape) {
        if (!scale && !scales_.contains(axis)) {
            throw std::invalid_argument(
                fmt::format("{} has values, but its axis {} has none", path, axis_entry(axis).name));
        }
        extents.push_back(scale ? values.size() : scales_.at(axis).length);
    }
    hdf5::Handle dataset = hdf5::write_dataset(image_.id(), path, extents, values);
    hdf5::write_attribute(dataset.id(), "units", entry.units);
    hdf5::write_attribute(dataset.id(), "description", entry.description);
    if (scale) {
        const std::string name(axis_entry(entry.shape.front()).name);
        hdf5::make_scale(dataset.id(), name);
        hdf5::label(dataset.id(), 0, name);
        scales_.emplace(entry.shape.front(), Scale{hdf5::open_object(image_.id(), path), values.size()});
        return dataset;
    }
    for (unsigned dimension = 0; dimension < entry.shape.size(); ++dimension) {
        const Axis axis = entry.shape[dimension];
        hdf5::attach_scale(dataset.id(), scales_.at(axis).dataset.id(), dimension,
                           std::string(axis_entry(axis).name));
    }
    return dataset;
}

void DatasetReader::enter(std::string_view method) {
    method_ = method;
    std::erase_if(lengths_, [](const auto& item) { return belongs_to_method(item.first); });
}

bool DatasetReader::has(std::string_view path) const {
    return hdf5::exists(image_.id(), with_method(path, method_));
}

hdf5::Handle DatasetReader::open(std::string_view path) const {
    return hdf5::open_object(image_.id(), with_method(path, method_));
}

template <typename T>
std::vector<T> DatasetReader::read(const DatasetEntry& entry) {
    const hdf5::Handle dataset = open(entry.path);
    const hdf5::Extents found = hdf5::extents(dataset.id());
    const auto misshapen = [&](std::string_view expected) {
        return hdf5::Error(fmt::format("{} has the shape ({}) instead of {}",
                                       with_method(entry.path, method_), fmt::join(found, ", "), expected));
    };
    if (is_scale(entry)) {
        if (found.size() != 1) throw misshapen("one dimension");
        const Axis axis = entry.shape.front();
        lengths_.insert_or_assign(axis, fixed_length(axis).value_or(found.front()));
    }
    hdf5::Extents expected;
    for (const Axis axis : entry.shape) {
        if (!lengths_.contains(axis)) {
            throw hdf5::Error(fmt::format("{} is missing", with_method(axis_entry(axis).scale, method_)));
        }
        expected.push_back(lengths_.at(axis));
    }
    if (found != expected) throw misshapen(fmt::format("({})", fmt::join(expected, ", ")));
    return hdf5::read_dataset<T>(dataset.id(), image_.size());
}

template hdf5::Handle DatasetWriter::write(const DatasetEntry&, std::span<const double>);
template hdf5::Handle DatasetWriter::write(const DatasetEntry&, std::span<const std::complex<double>>);
template hdf5::Handle DatasetWriter::write(const DatasetEntry&, std::span<const std::int32_t>);
template hdf5::Handle DatasetWriter::write(const DatasetEntry&, std::span<const std::string>);
template std::vector<double> DatasetReader::read(const DatasetEntry&);
template std::vector<std::complex<double>> DatasetReader::read(const DatasetEntry&);
template std::vector<std::int32_t> DatasetReader::read(const DatasetEntry&);
template std::vector<std::string> DatasetReader::read(const DatasetEntry&);

}  // namespace panelwright::io
