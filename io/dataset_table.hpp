/// The one description of the HDF5 layout: it drives the writer, the reader's checks and docs/datasets.md.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace panelwright::io {

/// What the elements of a dataset are.
enum class Element { real, complex, integer, text };

/// What a dimension of a dataset runs over.
enum class Axis {
    frequency,          ///< the band
    pattern_frequency,  ///< frequencies of patterns, figures and currents
    theta,
    phi,
    point,      ///< vertices of the mesh
    triangle,   ///< triangles of the mesh
    port_edge,  ///< edges of the mesh at the port
    corner,     ///< the three corners of a triangle
    end,        ///< the two ends of an edge
    xyz,        ///< the three Cartesian components
    post,
    remark
};

/// A dimension: its name, its symbol in the docs, and the one-dimensional dataset that is its dimension
/// scale.
struct AxisEntry {
    Axis axis;
    std::string_view name;    ///< name of the scale and label of every dimension that runs over it
    std::string_view symbol;  ///< its length: a letter, or the number where it is fixed
    std::string_view scale;   ///< path of the dataset
};

/// All axes.
std::span<const AxisEntry> axis_table();

/// The row of `axis`.
const AxisEntry& axis_entry(Axis axis);

/// One dataset. METHOD in a path stands for the name of a method, NAME for that of a health entry.
struct DatasetEntry {
    std::string path;
    Element element;
    std::vector<Axis> shape;  ///< empty = scalar
    std::string units;        ///< SI, or as the name says; "1" for a pure number, "text" for text
    std::string description;  ///< what it is
    std::string present;      ///< when the dataset is there: "always", "with patterns", …
};

/// All datasets, each dimension scale before the datasets that use it.
std::span<const DatasetEntry> dataset_table();

/// The row of `path` (with METHOD in it). Throws std::invalid_argument where the table has none.
const DatasetEntry& dataset_entry(std::string_view path);

/// One attribute of the file or of a group or dataset.
struct AttributeEntry {
    std::string_view object;  ///< path
    std::string_view name;
    std::string_view type;  ///< "text", "integer", …
    std::string_view description;
};

/// All attributes, apart from `units`, `description` and those of the dimension scales, which every dataset
/// has.
std::span<const AttributeEntry> attribute_table();

/// `path` with METHOD replaced by `method`.
std::string with_method(std::string_view path, std::string_view method);

}  // namespace panelwright::io
