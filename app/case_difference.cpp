#include "app/case_difference.hpp"

#include <fmt/format.h>

#include <cstdint>
#include <map>

#include "io/case_document.hpp"

namespace panelwright::app {
namespace {

using Keys = std::map<std::string, std::string>;

/// A value that is neither a list nor a table, whole.
std::string scalar(const io::Value& value) {
    if (const auto* text = std::get_if<std::string>(&value.data)) return *text;
    if (const auto* number = std::get_if<std::int64_t>(&value.data)) return fmt::format("{}", *number);
    if (const auto* number = std::get_if<double>(&value.data)) return fmt::format("{}", *number);
    return io::found(value);
}

void flatten(const std::string& path, const io::Value& value, Keys& keys);

void flatten(const std::string& path, const io::Members& members, Keys& keys) {
    for (const io::Member& member : members) {
        flatten(path.empty() ? member.key : fmt::format("{}.{}", path, member.key), member.value, keys);
    }
}

bool is_block(const io::List& list) {
    return !list.empty() && std::holds_alternative<io::Members>(list.front().data);
}

void flatten(const std::string& path, const io::Value& value, Keys& keys) {
    if (const auto* members = std::get_if<io::Members>(&value.data)) return flatten(path, *members, keys);
    const auto* list = std::get_if<io::List>(&value.data);
    if (list == nullptr) {
        keys[path] = scalar(value);
        return;
    }
    std::string items;
    for (std::size_t n = 0; n < list->size(); ++n) {
        if (is_block(*list)) {
            flatten(fmt::format("{}[{}]", path, n + 1), (*list)[n], keys);
        } else {
            items += (n == 0 ? "" : ", ") + scalar((*list)[n]);
        }
    }
    if (!is_block(*list)) keys[path] = items;
}

Keys all_keys(std::string_view text, std::string_view name) {
    Keys keys;
    flatten("", io::read_document(text, name), keys);
    return keys;
}

}  // namespace

std::vector<KeyDifference> case_differences(std::string_view stored, std::string_view asked) {
    if (stored == asked) return {};
    const Keys before = all_keys(stored, "the stored case");
    const Keys now = all_keys(asked, "the case");
    Keys both = before;
    both.insert(now.begin(), now.end());
    std::vector<KeyDifference> differences;
    const auto value = [](const Keys& keys, const std::string& key) {
        const auto place = keys.find(key);
        return place == keys.end() ? std::string() : place->second;
    };
    for (const auto& [key, unused] : both) {
        if (value(before, key) != value(now, key))
            differences.push_back({key, value(before, key), value(now, key)});
    }
    return differences;
}

}  // namespace panelwright::app
