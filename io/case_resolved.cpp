#include "io/case_resolved.hpp"

#include <fmt/format.h>

namespace panelwright::io {

namespace {

std::string toml_list(const std::vector<std::string>& items) {
    std::string text;
    for (const std::string& item : items) text += (text.empty() ? "" : ", ") + item;
    return "[" + text + "]";
}

std::string toml_value(KeyType type, const Checked& value) {
    if (type == KeyType::frequencies || type == KeyType::methods) {
        std::vector<std::string> items;
        for (const Checked& item : value.items) items.push_back(toml_string(item.text));
        return toml_list(items);
    }
    return type == KeyType::number || type == KeyType::count ? value.text : toml_string(value.text);
}

// `prefix` is "" or "post[2]".
std::string table_lines(const Reading& reading, std::string_view table, const std::string& prefix) {
    std::string lines;
    for (const Key& key : case_keys()) {
        if (key.table != table) continue;
        const Checked* value =
            reading.find(prefix.empty() ? std::string(key.name) : fmt::format("{}.{}", prefix, key.name));
        if (value != nullptr) lines += fmt::format("{} = {}\n", key.name, toml_value(key.type, *value));
    }
    return lines;
}

std::string vary_lines(const VaryBlock& block) {
    const auto value = [&](const std::string& text) { return block.bare ? text : toml_string(text); };
    std::vector<std::string> keys;
    for (const std::string& key : block.variation.keys) keys.push_back(toml_string(key));
    std::string lines = fmt::format("keys = {}\n", toml_list(keys));
    if (!block.from.empty()) {
        return lines + fmt::format("from = {}\nto = {}\nstep = {}\n", value(block.from), value(block.to),
                                   value(block.step));
    }
    std::vector<std::string> values;
    for (const std::string& text : block.variation.values) values.push_back(value(text));
    return lines + fmt::format("values = {}\n", toml_list(values));
}

}  // namespace

std::string toml_string(std::string_view text) {
    std::string quoted = "\"";
    for (const char c : text) {
        if (c == '"' || c == '\\') quoted += '\\';
        quoted += c;
    }
    return quoted + '"';
}

std::string resolved(const Reading& reading, const std::vector<VaryBlock>& blocks) {
    std::string text = table_lines(reading, "", "");
    for (const TableEntry& table : case_tables()) {
        if (table.name == "vary") {
            for (const VaryBlock& block : blocks)
                text += fmt::format("\n{}\n{}", table.header, vary_lines(block));
        } else if (table.repeated) {
            for (std::size_t i = 1; i <= reading.posts; ++i) {
                text += fmt::format("\n{}\n{}", table.header,
                                    table_lines(reading, table.name, fmt::format("{}[{}]", table.name, i)));
            }
        } else {
            text += fmt::format("\n{}\n{}", table.header,
                                table_lines(reading, table.name, std::string(table.name)));
        }
    }
    return text;
}

}  // namespace panelwright::io
