#include "io/hdf5_file.hpp"

#include <fmt/format.h>
#include <hdf5_hl.h>

#include <algorithm>
#include <cassert>
#include <type_traits>

namespace panelwright::io::hdf5 {
namespace {

using Complex = std::complex<double>;
static_assert(sizeof(Complex) == 2 * sizeof(double), "a complex number must be two doubles side by side");

void require(herr_t status, std::string_view what) {
    if (status < 0) throw Error(std::string(what));
}

Handle text_type() {
    Handle type(H5Tcopy(H5T_C_S1), H5Tclose, "no text type");
    require(H5Tset_size(type.id(), H5T_VARIABLE), "no variable-length text");
    require(H5Tset_cset(type.id(), H5T_CSET_UTF8), "no UTF-8 text");
    return type;
}

Handle complex_type() {
    Handle type(H5Tcreate(H5T_COMPOUND, sizeof(Complex)), H5Tclose, "no complex type");
    require(H5Tinsert(type.id(), "r", 0, H5T_IEEE_F64LE), "no real part");
    require(H5Tinsert(type.id(), "i", sizeof(double), H5T_IEEE_F64LE), "no imaginary part");
    return type;
}

/// The type in the file; in memory the same, for the machines this runs on are little-endian.
template <typename T>
Handle element_type() {
    if constexpr (std::is_same_v<T, double>) return Handle(H5Tcopy(H5T_IEEE_F64LE), H5Tclose, "no real type");
    if constexpr (std::is_same_v<T, Complex>) return complex_type();
    if constexpr (std::is_same_v<T, std::int32_t>) {
        return Handle(H5Tcopy(H5T_STD_I32LE), H5Tclose, "no integer type");
    }
    if constexpr (std::is_same_v<T, std::string>) return text_type();
}

Handle space(const Extents& extents) {
    if (extents.empty()) return Handle(H5Screate(H5S_SCALAR), H5Sclose, "no dataspace");
    return Handle(H5Screate_simple(static_cast<int>(extents.size()), extents.data(), nullptr), H5Sclose,
                  "no dataspace");
}

hsize_t product(const Extents& extents) {
    hsize_t count = 1;
    for (const hsize_t extent : extents) count *= extent;
    return count;
}

/// The library takes variable-length texts as pointers to C strings.
std::vector<const char*> pointers(std::span<const std::string> texts) {
    std::vector<const char*> result;
    for (const std::string& text : texts) {
        if (text.find('\0') != std::string::npos) {
            throw std::invalid_argument("a text with a NUL character cannot be stored");
        }
        result.push_back(text.c_str());
    }
    return result;
}

Handle link_properties() {
    Handle properties(H5Pcreate(H5P_LINK_CREATE), H5Pclose, "no link properties");
    require(H5Pset_create_intermediate_group(properties.id(), 1), "no groups on the way");
    return properties;
}

/// No times, so that the same result gives the same bytes.
Handle dataset_properties() {
    Handle properties(H5Pcreate(H5P_DATASET_CREATE), H5Pclose, "no dataset properties");
    require(H5Pset_obj_track_times(properties.id(), 0), "times cannot be left out");
    return properties;
}

/// For text, which the library converts on its way: the usual buffer of 1 MiB would be cleared twice a
/// dataset, however few texts it holds, and that takes longer than all else in a file.
Handle transfer_properties() {
    constexpr std::size_t buffer = 4096;
    Handle properties(H5Pcreate(H5P_DATASET_XFER), H5Pclose, "no transfer properties");
    require(H5Pset_buffer(properties.id(), buffer, nullptr, nullptr), "no transfer buffer");
    return properties;
}

/// Properties of a file in memory that never reaches the disk.
Handle memory_file_properties() {
    constexpr std::size_t growth = std::size_t{1} << 20U;
    Handle properties(H5Pcreate(H5P_FILE_ACCESS), H5Pclose, "no file properties");
    require(H5Pset_fapl_core(properties.id(), growth, 0), "no file in memory");
    require(H5Pset_libver_bounds(properties.id(), H5F_LIBVER_EARLIEST, H5F_LIBVER_V18), "no format bounds");
    return properties;
}

/// The library takes two open files of one name for the same file: hence a name that is unique while `owner`
/// lives.
std::string memory_name(const void* owner) {
    return fmt::format("panelwright-{}.memory", owner);
}

/// Path of an open group or dataset, for messages.
std::string where(hid_t object) {
    std::string path(256, '\0');
    const ssize_t length = H5Iget_name(object, path.data(), path.size());
    path.resize(std::min(path.size() - 1, static_cast<std::size_t>(std::max<ssize_t>(length, 0))));
    return path;
}

Error wrong(hid_t object, std::string_view what) {
    return Error(fmt::format("{} {}", where(object), what));
}

Error wrong_attribute(hid_t object, std::string_view name, std::string_view what) {
    return Error(fmt::format("the attribute {} of {} {}", name, where(object), what));
}

Handle open_attribute(hid_t object, const char* name) {
    if (H5Aexists(object, name) <= 0) throw wrong_attribute(object, name, "is missing");
    return Handle(H5Aopen(object, name, H5P_DEFAULT), H5Aclose, fmt::format("attribute {} is damaged", name));
}

/// True when elements of type `id` are what T stands for.
template <typename T>
bool holds(hid_t id) {
    if constexpr (std::is_same_v<T, std::string>) {
        return H5Tget_class(id) == H5T_STRING && H5Tis_variable_str(id) > 0;
    } else {
        const Handle expected = element_type<T>();
        return H5Tequal(id, expected.id()) > 0;
    }
}

/// Strings of a vlen buffer; gives the library's memory back.
std::vector<std::string> take_texts(std::vector<char*>& buffer, hid_t type, hid_t dataspace) {
    std::vector<std::string> texts;
    for (const char* text : buffer) texts.emplace_back(text == nullptr ? "" : text);
    H5Dvlen_reclaim(type, dataspace, H5P_DEFAULT, buffer.data());
    return texts;
}

template <typename T>
std::vector<T> read_attribute(hid_t object, const char* name) {
    const Handle attribute = open_attribute(object, name);
    const Handle type(H5Aget_type(attribute.id()), H5Tclose, "attribute without type");
    const Handle dataspace(H5Aget_space(attribute.id()), H5Sclose, "attribute without shape");
    if (!holds<T>(type.id())) throw wrong_attribute(object, name, "is of another type");
    const hssize_t count = H5Sget_simple_extent_npoints(dataspace.id());
    // Attributes are small; more than a million values can only be damage.
    if (count < 0 || count > 1'000'000) throw wrong_attribute(object, name, "is damaged");
    if (count == 0) return {};
    const Handle memory = element_type<T>();
    const std::string damaged = fmt::format("attribute {} cannot be read", name);
    if constexpr (std::is_same_v<T, std::string>) {
        std::vector<char*> buffer(static_cast<std::size_t>(count), nullptr);
        require(H5Aread(attribute.id(), memory.id(), buffer.data()), damaged);
        return take_texts(buffer, memory.id(), dataspace.id());
    } else {
        std::vector<T> values(static_cast<std::size_t>(count));
        require(H5Aread(attribute.id(), memory.id(), values.data()), damaged);
        return values;
    }
}

template <typename T>
T read_single_attribute(hid_t object, const char* name) {
    const std::vector<T> values = read_attribute<T>(object, name);
    if (values.size() != 1) throw wrong_attribute(object, name, "is not a single value");
    return values.front();
}

template <typename T>
void create_attribute(hid_t object, const char* name, const Extents& extents, std::span<const T> values) {
    const Handle type = element_type<T>();
    const Handle dataspace = space(extents);
    const std::string failed = fmt::format("attribute {} cannot be written", name);
    const Handle attribute(H5Acreate2(object, name, type.id(), dataspace.id(), H5P_DEFAULT, H5P_DEFAULT),
                           H5Aclose, failed);
    if (values.empty()) return;
    if constexpr (std::is_same_v<T, std::string>) {
        require(H5Awrite(attribute.id(), type.id(), pointers(values).data()), failed);
    } else {
        require(H5Awrite(attribute.id(), type.id(), values.data()), failed);
    }
}

}  // namespace

Quiet::Quiet() {
    H5Eget_auto2(H5E_DEFAULT, &print_, &print_data_);
    H5Eset_auto2(H5E_DEFAULT, nullptr, nullptr);
}

Quiet::~Quiet() {
    H5Eset_auto2(H5E_DEFAULT, print_, print_data_);
}

Handle::Handle(hid_t id, Close close, std::string_view what) : id_(id), close_(close) {
    if (id < 0) throw Error(std::string(what));
}

Handle& Handle::operator=(Handle&& other) noexcept {
    if (this != &other) {
        reset();
        id_ = std::exchange(other.id_, H5I_INVALID_HID);
        close_ = other.close_;
    }
    return *this;
}

void Handle::reset() noexcept {
    if (id_ >= 0) close_(id_);
    id_ = H5I_INVALID_HID;
}

Image::Image() {
    const Handle access = memory_file_properties();
    file_ = Handle(H5Fcreate(memory_name(this).c_str(), H5F_ACC_TRUNC, H5P_DEFAULT, access.id()), H5Fclose,
                   "no memory for an HDF5 file");
}

Image::Image(const std::string& bytes) : size_(bytes.size()) {
    constexpr std::string_view signature = "\x89HDF\r\n\x1a\n";
    if (!bytes.starts_with(signature)) throw Error("this is not an HDF5 file");
    const Handle access = memory_file_properties();
    // The library copies the bytes, whatever the missing const suggests.
    std::string& source = const_cast<std::string&>(bytes);
    require(H5Pset_file_image(access.id(), source.data(), source.size()), "no memory for the file");
    file_ = Handle(H5Fopen(memory_name(this).c_str(), H5F_ACC_RDONLY, access.id()), H5Fclose,
                   "the file is truncated or damaged");
}

std::string Image::bytes() const {
    require(H5Fflush(id(), H5F_SCOPE_GLOBAL), "the file cannot be completed");
    const ssize_t size = H5Fget_file_image(id(), nullptr, 0);
    if (size < 0) throw Error("the file cannot be completed");
    std::string result(static_cast<std::size_t>(size), '\0');
    if (H5Fget_file_image(id(), result.data(), result.size()) != size)
        throw Error("the file cannot be completed");
    return result;
}

template <typename T>
Handle write_dataset(hid_t file, const std::string& path, const Extents& extents, std::span<const T> values) {
    if (values.size() != product(extents)) {
        throw std::invalid_argument(fmt::format("{}: {} values do not fill the shape ({})", path,
                                                values.size(), fmt::join(extents, ", ")));
    }
    const Handle type = element_type<T>();
    const Handle dataspace = space(extents);
    const Handle links = link_properties();
    const Handle creation = dataset_properties();
    const Handle transfer = transfer_properties();
    const std::string failed = path + " cannot be written";
    Handle dataset(
        H5Dcreate2(file, path.c_str(), type.id(), dataspace.id(), links.id(), creation.id(), H5P_DEFAULT),
        H5Dclose, failed);
    if constexpr (std::is_same_v<T, std::string>) {
        const std::vector<const char*> buffer = pointers(values);
        require(H5Dwrite(dataset.id(), type.id(), H5S_ALL, H5S_ALL, transfer.id(), buffer.data()), failed);
    } else {
        require(H5Dwrite(dataset.id(), type.id(), H5S_ALL, H5S_ALL, transfer.id(), values.data()), failed);
    }
    return dataset;
}

bool exists(hid_t file, const std::string& path) {
    assert(path.starts_with('/'));
    for (std::size_t end = path.find('/', 1);; end = path.find('/', end + 1)) {
        if (H5Lexists(file, path.substr(0, end).c_str(), H5P_DEFAULT) <= 0) return false;
        if (end == std::string::npos) return true;
    }
}

Handle open_object(hid_t file, const std::string& path) {
    if (!exists(file, path)) throw Error(path + " is missing");
    return Handle(H5Oopen(file, path.c_str(), H5P_DEFAULT), H5Oclose, path + " is damaged");
}

Extents extents(hid_t dataset) {
    if (H5Iget_type(dataset) != H5I_DATASET) throw wrong(dataset, "is not a dataset");
    const Handle dataspace(H5Dget_space(dataset), H5Sclose, "has no shape");
    const int rank = H5Sget_simple_extent_ndims(dataspace.id());
    if (rank < 0) throw wrong(dataset, "has no shape");
    Extents result(static_cast<std::size_t>(rank));
    require(H5Sget_simple_extent_dims(dataspace.id(), result.data(), nullptr), "has no shape");
    return result;
}

template <typename T>
std::vector<T> read_dataset(hid_t dataset, std::size_t size_limit) {
    const hsize_t count = product(extents(dataset));
    const Handle type(H5Dget_type(dataset), H5Tclose, "has no element type");
    if (!holds<T>(type.id())) throw wrong(dataset, "holds elements of another type");
    const hsize_t stored = H5Dget_storage_size(dataset);
    // Texts lie elsewhere in the file; here are only references to them.
    const bool complete = std::is_same_v<T, std::string> ? count <= stored : count == stored / sizeof(T);
    if (stored > size_limit || !complete) throw wrong(dataset, "is damaged");
    const Handle memory = element_type<T>();
    const Handle transfer = transfer_properties();
    const auto read = [&](void* buffer) {
        if (H5Dread(dataset, memory.id(), H5S_ALL, H5S_ALL, transfer.id(), buffer) < 0) {
            throw wrong(dataset, "cannot be read");
        }
    };
    if constexpr (std::is_same_v<T, std::string>) {
        std::vector<char*> buffer(count, nullptr);
        read(buffer.data());
        const Handle dataspace(H5Dget_space(dataset), H5Sclose, "has no shape");
        return take_texts(buffer, memory.id(), dataspace.id());
    } else {
        std::vector<T> values(count);
        read(values.data());
        return values;
    }
}

void write_attribute(hid_t object, const char* name, const std::string& text) {
    create_attribute<std::string>(object, name, {}, {&text, 1});
}

void write_attribute(hid_t object, const char* name, std::int32_t number) {
    create_attribute<std::int32_t>(object, name, {}, {&number, 1});
}

void write_attribute(hid_t object, const char* name, std::span<const double> numbers) {
    create_attribute<double>(object, name, {numbers.size()}, numbers);
}

void write_attribute(hid_t object, const char* name, std::span<const std::string> texts) {
    create_attribute<std::string>(object, name, {texts.size()}, texts);
}

std::string text_attribute(hid_t object, const char* name) {
    return read_single_attribute<std::string>(object, name);
}

std::int32_t integer_attribute(hid_t object, const char* name) {
    return read_single_attribute<std::int32_t>(object, name);
}

std::vector<double> real_attribute(hid_t object, const char* name) {
    return read_attribute<double>(object, name);
}

std::vector<std::string> texts_attribute(hid_t object, const char* name) {
    return read_attribute<std::string>(object, name);
}

void make_scale(hid_t dataset, const std::string& name) {
    require(H5DSset_scale(dataset, name.c_str()), "no dimension scale " + name);
}

void attach_scale(hid_t dataset, hid_t scale, unsigned dimension, const std::string& name) {
    require(H5DSattach_scale(dataset, scale, dimension), "cannot attach the dimension scale " + name);
    label(dataset, dimension, name);
}

void label(hid_t dataset, unsigned dimension, const std::string& name) {
    require(H5DSset_label(dataset, dimension, name.c_str()), "no label " + name);
}

template Handle write_dataset(hid_t, const std::string&, const Extents&, std::span<const double>);
template Handle write_dataset(hid_t, const std::string&, const Extents&, std::span<const Complex>);
template Handle write_dataset(hid_t, const std::string&, const Extents&, std::span<const std::int32_t>);
template Handle write_dataset(hid_t, const std::string&, const Extents&, std::span<const std::string>);
template std::vector<double> read_dataset(hid_t, std::size_t);
template std::vector<Complex> read_dataset(hid_t, std::size_t);
template std::vector<std::int32_t> read_dataset(hid_t, std::size_t);
template std::vector<std::string> read_dataset(hid_t, std::size_t);

}  // namespace panelwright::io::hdf5
