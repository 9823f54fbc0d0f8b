#include <fmt/format.h>
#include <openssl/evp.h>

#include <array>
#include <stdexcept>

#include "io/case.hpp"

namespace panelwright::io {

// FIPS 180-4 by OpenSSL, which the HDF5 library brings along anyway.
std::string sha256(std::string_view text) {
    std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
    unsigned int size = 0;
    if (EVP_Digest(text.data(), text.size(), digest.data(), &size, EVP_sha256(), nullptr) != 1) {
        throw std::runtime_error("the SHA-256 of the case file could not be computed");
    }
    std::string hexadecimal;
    for (unsigned int i = 0; i < size; ++i) hexadecimal += fmt::format("{:02x}", digest[i]);
    return hexadecimal;
}

}  // namespace panelwright::io
