#include "io/case_keys.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "io/case.hpp"
#include "solver/materials.hpp"
#include "solver/methods.hpp"

namespace panelwright::io {

namespace {

std::string_view type_words(KeyType type) {
    switch (type) {
        case KeyType::text:
            return "text";
        case KeyType::length:
            return "length";
        case KeyType::frequency:
            return "frequency";
        case KeyType::resistance:
            return "resistance";
        case KeyType::conductivity:
            return "conductivity";
        case KeyType::number:
            return "number";
        case KeyType::count:
            return "whole number";
        case KeyType::feed_kind:
        case KeyType::accuracy:
            return "word";
        case KeyType::metal:
            return "name of a metal";
        case KeyType::frequencies:
            return "list of frequencies";
        case KeyType::methods:
            return "list of words";
        case KeyType::key_names:
            return "list of keys";
        case KeyType::varied:
            return "as the varied keys";
        case KeyType::varied_list:
            break;
    }
    return "list of values, each as the varied keys";
}

std::string default_words(const Key& key) {
    if (key.fallback == derived) return std::string(key.fallback_words);
    if (key.fallback == required || key.fallback == none) return std::string(key.fallback);
    if (key.type == KeyType::number || key.type == KeyType::count) return std::string(key.fallback);
    return fmt::format("\"{}\"", key.fallback);
}

std::vector<KeyEntry> made_entries() {
    std::vector<KeyEntry> entries;
    for (const Key& key : case_keys()) {
        std::string description(key.description);
        if (!key.feed.empty())
            description = fmt::format("Only for feed.kind = \"{}\": {}", key.feed, description);
        const auto kind = dimension(key.type);
        entries.push_back({path(key), std::string(type_words(key.type)), kind ? unit_list(*kind) : "",
                           default_words(key), allowed(key), std::move(description)});
    }
    return entries;
}

}  // namespace

const TableEntry* find_table(std::string_view name) {
    const auto tables = case_tables();
    const auto table = std::ranges::find(tables, name, &TableEntry::name);
    return table == tables.end() ? nullptr : &*table;
}

const Key* find_key(std::string_view table, std::string_view name) {
    const auto keys = case_keys();
    const auto key =
        std::ranges::find_if(keys, [&](const Key& k) { return k.table == table && k.name == name; });
    return key == keys.end() ? nullptr : &*key;
}

std::string path(const Key& key) {
    return key.table.empty() ? std::string(key.name) : fmt::format("{}.{}", key.table, key.name);
}

std::optional<Dimension> dimension(KeyType type) {
    switch (type) {
        case KeyType::length:
            return Dimension::length;
        case KeyType::frequency:
        case KeyType::frequencies:
            return Dimension::frequency;
        case KeyType::resistance:
            return Dimension::resistance;
        case KeyType::conductivity:
            return Dimension::conductivity;
        default:
            return std::nullopt;
    }
}

bool is_numeric(KeyType type) {
    return type == KeyType::number || type == KeyType::count ||
           (dimension(type).has_value() && type != KeyType::frequencies);
}

std::vector<std::string_view> words(KeyType type) {
    std::vector<std::string_view> list;
    switch (type) {
        case KeyType::feed_kind:
            return {"probe", "tab"};
        case KeyType::accuracy:
            return {"quick", "normal", "fine"};
        case KeyType::metal:
            for (const solver::Metal& metal : solver::metals()) list.push_back(metal.name);
            return list;
        case KeyType::methods:
            for (const solver::Method method : solver::known_methods) list.push_back(solver::name(method));
            return list;
        default:
            return list;
    }
}

std::string one_of(std::span<const std::string_view> words) {
    std::string text;
    for (std::size_t i = 0; i < words.size(); ++i) {
        if (i > 0) text += i + 1 == words.size() ? " or " : ", ";
        text += words[i];
    }
    return text;
}

std::string allowed(const Key& key) {
    switch (key.type) {
        case KeyType::text:
            return fmt::format("one line of at most {} characters", longest_title);
        case KeyType::frequencies:
            return fmt::format("inside the band, 1 to {} different ones", most_pattern_frequencies);
        case KeyType::methods: {
            std::vector<std::string_view> available;
            for (const solver::Method method : solver::available_methods())
                available.push_back(solver::name(method));
            return fmt::format("{}; in this version: {}", one_of(words(key.type)), one_of(available));
        }
        case KeyType::key_names:
            return "numeric keys, each varied once in the file";
        case KeyType::varied:
            return key.name == "step" ? "not zero" : "as for the varied keys";
        case KeyType::varied_list:
            return fmt::format("at least 1; at most {} designs in all", most_designs);
        default:
            break;
    }
    if (is_numeric(key.type)) return fmt::format("{} to {}", key.smallest, key.largest);
    return one_of(words(key.type));
}

std::span<const KeyEntry> key_table() {
    static const std::vector<KeyEntry> entries = made_entries();
    return entries;
}

}  // namespace panelwright::io
