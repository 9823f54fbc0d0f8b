#include "app/results_folder.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <cerrno>
#include <system_error>

#include "app/atomic_file.hpp"
#include "app/case_difference.hpp"
#include "app/exit_status.hpp"
#include "io/case.hpp"
#include "io/file.hpp"
#include "io/suggest.hpp"
#include "solver/methods.hpp"

namespace panelwright::app {
namespace {

namespace fs = std::filesystem;

constexpr std::size_t most_keys_named = 12;

/// True for "0001.h5" and longer numbers.
bool is_design_file(const std::string& name) {
    const std::string stem = name.substr(0, name.find('.'));
    return name == stem + ".h5" && stem.size() >= 4 &&
           std::all_of(stem.begin(), stem.end(), [](char c) { return c >= '0' && c <= '9'; });
}

/// True for the names of files with results in the result folder itself.
bool is_result_file(const std::string& name) {
    if (name == "result.h5" || name == "designs.csv") return true;
    for (const solver::Method method : solver::known_methods) {
        const ResultsFolder here{};
        if (name == here.s11(method) || name == here.pattern_table(method)) return true;
        for (const std::string_view kind : {"currents", "pattern"}) {
            const std::string stem = ResultsFolder::scene_stem(kind, method);
            // The stem is followed by nothing or by a frequency: currents_aperture.vtp,
            // currents_aperture_3400MHz.vtp.
            if (name == stem + ".vtp" || name == stem + ".pvd") return true;
            if (name.starts_with(stem + "_") && name.ends_with("MHz.vtp")) return true;
        }
    }
    return false;
}

/// Files of this program in `folder`, the record of the case last, so that a removal that is cut off can be
/// repeated.
std::vector<fs::path> own_files(const ResultsFolder& folder) {
    std::vector<fs::path> files;
    for (const fs::directory_entry& entry : fs::directory_iterator(folder.folder)) {
        const bool own = is_result_file(entry.path().filename().string()) || is_temporary(entry.path());
        if (own && entry.is_regular_file()) files.push_back(entry.path());
    }
    if (fs::is_directory(folder.designs())) {
        for (const fs::directory_entry& entry : fs::directory_iterator(folder.designs())) {
            const bool own = is_design_file(entry.path().filename().string()) || is_temporary(entry.path());
            if (own && entry.is_regular_file()) files.push_back(entry.path());
        }
    }
    if (fs::is_regular_file(folder.case_record())) files.push_back(folder.case_record());
    return files;
}

std::string difference_message(const fs::path& folder, const std::vector<KeyDifference>& differences) {
    std::string message =
        fmt::format("{}: holds the results of another case; keys that differ:\n", folder.string());
    const auto value = [](const std::string& text) {
        return text.empty() ? std::string("none") : io::shown(text);
    };
    for (std::size_t n = 0; n < std::min(differences.size(), most_keys_named); ++n) {
        message += fmt::format("  {}: {} there, {} now\n", differences[n].key, value(differences[n].stored),
                               value(differences[n].asked));
    }
    if (differences.size() > most_keys_named) {
        message += fmt::format("  and {} more\n", differences.size() - most_keys_named);
    }
    return message + "choose another folder with --out DIR, or start over with --fresh";
}

void refuse_other_case(const ResultsFolder& folder, const std::string& resolved) {
    const std::vector<fs::path> files = own_files(folder);
    if (files.empty()) return;
    const auto unknown = [&] {
        return UsageError(
            fmt::format("{}: holds results, but case.toml, which says of which case, is missing or "
                        "damaged; choose another folder with --out DIR, or start over with --fresh",
                        folder.folder.string()));
    };
    if (files.back() != folder.case_record()) throw unknown();
    const std::string stored = io::read_file(folder.case_record());
    std::vector<KeyDifference> differences;
    try {
        differences = case_differences(stored, resolved);
    } catch (const io::CaseError&) {
        throw unknown();
    }
    if (!differences.empty()) throw UsageError(difference_message(folder.folder, differences));
}

[[noreturn]] void fail(const fs::filesystem_error& error, const fs::path& folder) {
    const fs::path& at = error.path1().empty() ? folder : error.path1();
    throw io::FileError(fmt::format("{}: {}", at.string(), error.code().message()));
}

/// Finds out whether `folder` could be created, by creating the first of its missing parts and removing it.
void try_to_create(const fs::path& folder) {
    fs::path missing = fs::absolute(folder).lexically_normal();
    if (!missing.has_filename()) missing = missing.parent_path();  // "results/"
    while (missing.has_relative_path() && !fs::exists(missing.parent_path())) missing = missing.parent_path();
    std::error_code error;
    fs::create_directory(missing, error);
    if (error) {
        throw io::FileError(
            fmt::format("{}: the folder cannot be created: {}", folder.string(), error.message()));
    }
    fs::remove(missing, error);
}

}  // namespace

fs::path ResultsFolder::design(std::size_t number) const {
    return designs() / fmt::format("{:04}.h5", number);
}

fs::path ResultsFolder::s11(solver::Method method) const {
    return folder / fmt::format("s11_{}.s1p", solver::name(method));
}

fs::path ResultsFolder::pattern_table(solver::Method method) const {
    return folder / fmt::format("pattern_{}.csv", solver::name(method));
}

std::string ResultsFolder::scene_stem(std::string_view kind, solver::Method method) {
    return fmt::format("{}_{}", kind, solver::name(method));
}

fs::path default_folder(const fs::path& case_file) {
    return case_file.stem().string() + "-results";
}

void check_folder(const ResultsFolder& folder, const std::string& resolved, Existing existing) {
    try {
        if (!fs::exists(folder.folder)) return try_to_create(folder.folder);
        if (!fs::is_directory(folder.folder)) {
            throw io::FileError(fmt::format("{}: is not a folder; choose another one with --out DIR",
                                            folder.folder.string()));
        }
        if (access(folder.folder.c_str(), W_OK | X_OK) != 0) {
            throw io::FileError(fmt::format("{}: cannot be written to: {}", folder.folder.string(),
                                            std::generic_category().message(errno)));
        }
        if (existing == Existing::keep) refuse_other_case(folder, resolved);
    } catch (const fs::filesystem_error& error) {
        fail(error, folder.folder);
    }
}

void claim_folder(const ResultsFolder& folder, const std::string& resolved, Existing existing) {
    try {
        fs::create_directories(folder.folder);
        if (existing == Existing::replace) {
            for (const fs::path& file : own_files(folder)) fs::remove(file);
        }
    } catch (const fs::filesystem_error& error) {
        fail(error, folder.folder);
    }
    commit_file(folder.case_record(), [&](const fs::path& path) { io::write_file(path, resolved); });
}

}  // namespace panelwright::app
