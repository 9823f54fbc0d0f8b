#include "io/case_vary.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <optional>

#include "io/suggest.hpp"

namespace panelwright::io {

namespace {

// A step count that misses a whole number by this much is taken as that number.
constexpr double step_slack = 1e-9;

struct VariedKey {
    const Key* key;
    std::string path;
    Position at;
};

class VaryReader {
  public:
    explicit VaryReader(const Reading& reading) : reading_(reading) {}

    VaryReading read(const List& blocks) {
        for (std::size_t i = 0; i < blocks.size(); ++i) {
            const auto* members = std::get_if<Members>(&blocks[i].data);
            if (members != nullptr) read_block(*members, blocks[i].at, fmt::format("vary[{}]", i + 1));
        }
        result_.problems = problems_.sorted();
        return std::move(result_);
    }

  private:
    std::nullopt_t fail(Position at, std::string message) {
        problems_.add(at, std::move(message));
        return std::nullopt;
    }

    void read_block(const Members& block, Position header, const std::string& name) {
        const std::vector<VariedKey> keys = read_names(block, header, name);
        if (keys.empty()) return;
        const Key& type = *keys.front().key;
        const bool has_range =
            find(block, "from") != nullptr || find(block, "to") != nullptr || find(block, "step") != nullptr;
        const Member* values = find(block, "values");
        VaryBlock result;
        result.bare = !dimension(type.type).has_value();
        for (const VariedKey& key : keys) result.variation.keys.push_back(key.path);
        if (values != nullptr && has_range) {
            fail(
                values->at,
                fmt::format("{}.values stands beside from, to or step; allowed: either the list or the range",
                            name));
        } else if (values != nullptr) {
            result.variation.values = read_list(type, values->value, name + ".values");
        } else if (!has_range) {
            fail(header,
                 fmt::format("{} has no values; allowed: values, or from, to and step together", name));
        } else {
            read_range(type, block, header, name, result);
        }
        if (result.variation.values.empty()) return;
        designs_ *= static_cast<double>(result.variation.values.size());
        if (designs_ > static_cast<double>(most_designs)) {
            fail(header, fmt::format("{} brings the grid to {:.0f} designs; allowed: at most {}", name,
                                     designs_, most_designs));
            return;
        }
        result_.blocks.push_back(std::move(result));
    }

    std::vector<VariedKey> read_names(const Members& block, Position header, const std::string& name) {
        const std::string example = "write keys = [\"reflector.length\"]";
        std::vector<VariedKey> keys;
        const Member* member = find(block, "keys");
        if (member == nullptr) {
            fail(header, fmt::format("{}.keys is missing; {}", name, example));
            return {};
        }
        const auto* list = std::get_if<List>(&member->value.data);
        if (list == nullptr || list->empty()) {
            fail(member->value.at,
                 fmt::format("{}.keys: found {}; {}", name,
                             list == nullptr ? found(member->value) : "an empty list", example));
            return {};
        }
        if (list->size() > most_varied_keys) {
            fail(member->value.at, fmt::format("{}.keys: found {} keys; allowed: at most {}", name,
                                               list->size(), most_varied_keys));
            return {};
        }
        bool complete = true;
        for (const Value& entry : *list) {
            const auto* text = std::get_if<std::string>(&entry.data);
            if (text == nullptr) {
                fail(entry.at, fmt::format("{}.keys: found {}; {}", name, found(entry), example));
                complete = false;
            } else if (auto key = read_name(*text, entry.at, name + ".keys")) {
                keys.push_back(std::move(*key));
            } else {
                complete = false;
            }
        }
        return complete && of_one_type(keys, name) ? keys : std::vector<VariedKey>{};
    }

    std::optional<VariedKey> read_name(const std::string& text, Position at, const std::string& where) {
        const auto parts = parse_path(text);
        const Key* key = parts ? find_key(parts->table, parts->name) : nullptr;
        if (key == nullptr) {
            const std::string near = nearest_key(text);
            return fail(at, fmt::format("{}: {} is no key; {}", where, shown(text),
                                        near.empty()
                                            ? "`panelwright keys` lists those that there are"
                                            : fmt::format("the nearest that can be varied is \"{}\"", near)));
        }
        if (!is_numeric(key->type)) {
            return fail(at, fmt::format("{}: \"{}\" holds no number; allowed: numeric keys", where, text));
        }
        const TableEntry* table = find_table(key->table);
        if (table->repeated && (parts->index == 0 || parts->index > reading_.posts)) {
            return fail(
                at, fmt::format("{}: {} names none of the {} posts; allowed: \"post[1].{}\", counted from 1",
                                where, shown(text), reading_.posts, key->name));
        }
        if (!table->repeated && parts->index > 0) {
            return fail(at, fmt::format("{}: {} has a number, but {} stands once; write \"{}\"", where,
                                        shown(text), table->header, path(*key)));
        }
        if (!applies(*key, text, at, where)) return std::nullopt;
        const auto twice = std::ranges::find(varied_, text, &VariedKey::path);
        if (twice != varied_.end()) {
            return fail(at, fmt::format("{}: \"{}\" is varied twice, first at {}; allowed: once", where, text,
                                        io::text(twice->at)));
        }
        varied_.push_back({key, text, at});
        return varied_.back();
    }

    bool applies(const Key& key, const std::string& text, Position at, const std::string& where) {
        const Checked* kind = reading_.find("feed.kind");
        if (!key.feed.empty() && kind != nullptr && kind->text != key.feed) {
            fail(at, fmt::format("{}: \"{}\" belongs to a feed of kind \"{}\", but {}", where, text, key.feed,
                                 named(reading_, "feed.kind")));
            return false;
        }
        const std::string metal = std::string(key.table) + ".metal";
        const Checked* given = key.type == KeyType::conductivity ? reading_.find(metal) : nullptr;
        if (given != nullptr && given->given) {
            fail(at, fmt::format("{}: \"{}\" and {} exclude each other; give conductivity there", where, text,
                                 named(reading_, metal)));
            return false;
        }
        return true;
    }

    static std::string nearest_key(const std::string& text) {
        std::vector<std::string> paths;
        for (const Key& key : case_keys()) {
            if (!is_numeric(key.type)) continue;
            const bool repeated = find_table(key.table)->repeated;
            paths.push_back(repeated ? fmt::format("{}[1].{}", key.table, key.name) : path(key));
        }
        const std::vector<std::string_view> known(paths.begin(), paths.end());
        return std::string(nearest(text, known));
    }

    bool of_one_type(const std::vector<VariedKey>& keys, const std::string& name) {
        for (const VariedKey& key : keys) {
            if (key.key->type == keys.front().key->type) continue;
            fail(key.at,
                 fmt::format(
                     "{}.keys: \"{}\" and \"{}\" at {} are of different types; allowed: keys of one type in "
                     "a block",
                     name, key.path, keys.front().path, text(keys.front().at)));
            return false;
        }
        return true;
    }

    std::optional<Checked> read_value(const Key& type, const Value& value, const std::string& where) {
        const Outcome outcome = check_number(type, where, value);
        if (const auto* checked = std::get_if<Checked>(&outcome)) return *checked;
        problems_.add(std::get<std::vector<CaseProblem>>(outcome));
        return std::nullopt;
    }

    std::vector<std::string> read_list(const Key& type, const Value& value, const std::string& where) {
        const auto* list = std::get_if<List>(&value.data);
        if (list == nullptr || list->empty()) {
            fail(value.at, fmt::format("{}: found {}; allowed: a list of at least one value", where,
                                       list == nullptr ? found(value) : "an empty list"));
            return {};
        }
        std::vector<std::string> values;
        for (const Value& entry : *list) {
            if (auto checked = read_value(type, entry, where)) values.push_back(std::move(checked->text));
        }
        return values.size() == list->size() ? values : std::vector<std::string>{};
    }

    std::optional<Checked> read_end(const Key& type, const Members& block, Position header,
                                    const std::string& name, std::string_view end) {
        const Member* member = find(block, end);
        if (member == nullptr) {
            return fail(
                header,
                fmt::format("{}.{} is missing; allowed: from, to and step together, or values", name, end));
        }
        return read_value(type, member->value, fmt::format("{}.{}", name, end));
    }

    void read_range(const Key& type, const Members& block, Position header, const std::string& name,
                    VaryBlock& result) {
        const auto from = read_end(type, block, header, name, "from");
        const auto to = read_end(type, block, header, name, "to");
        const auto step = read_end(type, block, header, name, "step");
        if (!from || !to || !step) return;
        const double steps = (to->number - from->number) / step->number;
        if (step->number == 0.0 || !std::isfinite(steps) || steps < -step_slack) {
            fail(step->at,
                 fmt::format("{}.step: {} does not lead from {} at {} to {} at {}; allowed: not zero, {}",
                             name, shown(step->text), shown(from->text), text(from->at), shown(to->text),
                             text(to->at), to->number < from->number ? "negative" : "positive"));
            return;
        }
        const double count = std::floor(steps + step_slack) + 1.0;
        if (count > static_cast<double>(most_designs)) {
            fail(step->at, fmt::format("{}.step: {} makes {:.0f} values; allowed: at most {}", name,
                                       shown(step->text), count, most_designs));
            return;
        }
        result.from = from->text;
        result.to = to->text;
        result.step = step->text;
        result.variation.values = range_values(type, *from, *step, static_cast<std::size_t>(count));
    }

    // In the unit of `from`, with twelve digits: what a person would have written.
    static std::vector<std::string> range_values(const Key& type, const Checked& from, const Checked& step,
                                                 std::size_t count) {
        const auto kind = dimension(type.type);
        const Unit unit =
            kind ? std::get<Quantity>(parse_quantity(from.text, *kind)).unit : Unit{"", 1.0, 1.0};
        std::vector<std::string> values = {from.text};
        for (std::size_t i = 1; i < count; ++i) {
            const double si = from.number + static_cast<double>(i) * step.number;
            const std::string number = rounded(si * unit.over / unit.times);
            values.push_back(kind                           ? fmt::format("{} {}", number, unit.name)
                             : type.type == KeyType::number ? with_point(number)
                                                            : number);
        }
        return values;
    }

    const Reading& reading_;
    VaryReading result_;
    ProblemList problems_;
    std::vector<VariedKey> varied_;
    double designs_ = 1.0;
};

Value value_of(const std::string& text, Position at) {
    const char* end = text.data() + text.size();
    std::int64_t whole = 0;
    if (const auto [rest, status] = std::from_chars(text.data(), end, whole);
        status == std::errc() && rest == end) {
        return {at, whole};
    }
    double real = 0.0;
    if (const auto [rest, status] = std::from_chars(text.data(), end, real);
        status == std::errc() && rest == end) {
        return {at, real};
    }
    return {at, text};
}

// Where value `index` of a block stands: in its list, or at the start of its range.
Position place_of(const Members& block, std::size_t index) {
    if (const Member* values = find(block, "values")) {
        const auto* list = std::get_if<List>(&values->value.data);
        return list != nullptr && index < list->size() ? (*list)[index].at : values->value.at;
    }
    const Member* from = find(block, "from");
    return from == nullptr ? Position{} : from->value.at;
}

}  // namespace

VaryReading read_variations(const Members& document, const Reading& reading) {
    const Member* vary = find(document, "vary");
    const auto* blocks = vary == nullptr ? nullptr : std::get_if<List>(&vary->value.data);
    if (blocks == nullptr || blocks->size() > most_vary_blocks) return {};
    return VaryReader(reading).read(*blocks);
}

Members with_variation(Members document, const Members& original, const Variation& variation,
                       std::size_t block, std::size_t index) {
    Position at;
    const Member* vary = find(original, "vary");
    if (vary != nullptr) {
        const auto* blocks = std::get_if<List>(&vary->value.data);
        if (blocks != nullptr && block < blocks->size())
            at = place_of(std::get<Members>((*blocks)[block].data), index);
    }
    for (const std::string& key : variation.keys) {
        const auto path = parse_path(key);
        if (path) document = with_value(std::move(document), *path, value_of(variation.values[index], at));
    }
    return document;
}

std::size_t grid_size(const std::vector<Variation>& variations) {
    std::size_t size = 1;
    for (const Variation& variation : variations) size *= variation.values.size();
    return size;
}

std::vector<std::size_t> grid_position(const std::vector<Variation>& variations, std::size_t index) {
    std::vector<std::size_t> position(variations.size());
    for (std::size_t i = variations.size(); i-- > 0;) {
        position[i] = index % variations[i].values.size();
        index /= variations[i].values.size();
    }
    return position;
}

}  // namespace panelwright::io
