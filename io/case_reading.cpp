#include "io/case_reading.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cassert>

#include "io/suggest.hpp"

namespace panelwright::io {

namespace {

constexpr std::size_t most_problems = 100;

// Builds a Reading table by table.
class Reader {
  public:
    explicit Reader(const Members& document) : document_(document) {}

    Reading reading() {
        read_top_level();
        for (const TableEntry& table : case_tables()) {
            const Member* member = find(document_, table.name);
            if (member == nullptr) {
                read_missing(table);
            } else if (table.repeated) {
                read_blocks(table, *member);
            } else {
                read_single(table, *member);
            }
        }
        exclude("patch.metal", "patch.conductivity");
        exclude("reflector.metal", "reflector.conductivity");
        reading_.problems = problems_.sorted();
        return std::move(reading_);
    }

  private:
    void fail(std::string_view path, Position at, std::string message) {
        reading_.failed.insert(std::string(path));
        problems_.add(at, std::move(message));
    }

    void read_top_level() {
        std::vector<std::string_view> known;
        for (const Key& key : case_keys()) {
            if (key.table.empty()) known.push_back(key.name);
        }
        for (const TableEntry& table : case_tables()) known.push_back(table.name);
        for (const Member& member : document_) {
            if (problems_.full()) return;
            if (std::ranges::find(known, member.key) == known.end()) {
                problems_.add(member.at, unknown(member.key, "", "outside all tables", known));
            }
        }
        for (const Key& key : case_keys()) {
            if (key.table.empty()) read_key(key, path(key), find(document_, key.name), {});
        }
    }

    static std::string unknown(std::string_view key, std::string_view table, std::string_view where,
                               std::span<const std::string_view> known) {
        std::vector<std::string_view> homes;
        for (const Key& other : case_keys()) {
            if (other.name != key || other.table.empty() || other.table == table) continue;
            homes.push_back(find_table(other.table)->header);
        }
        if (!homes.empty())
            return fmt::format("unknown key {} {}; it belongs in {}", shown(key), where, one_of(homes));
        if (const TableEntry* const block = find_table(key); block != nullptr && !table.empty()) {
            return fmt::format("unknown key {} {}; it is a table of its own, written as {}", shown(key),
                               where, block->header);
        }
        const std::string_view near = nearest(key, known);
        return near.empty() ? fmt::format("unknown key {} {}; known: {}", shown(key), where, one_of(known))
                            : fmt::format("unknown key {} {}; the nearest known key is \"{}\"", shown(key),
                                          where, near);
    }

    void read_missing(const TableEntry& table) {
        if (table.repeated) return;
        if (!table.required) {
            read_table(table, std::string(table.name), {}, {});
            return;
        }
        std::string needs;
        for (const Key& key : case_keys()) {
            if (key.table != table.name || key.fallback != required || !key.feed.empty()) continue;
            needs += fmt::format("{}{}", needs.empty() ? "" : ", ", key.name);
        }
        fail(table.name, {},
             fmt::format("the table {} is missing; it must hold at least {}", table.header, needs));
    }

    void read_single(const TableEntry& table, const Member& member) {
        if (const auto* members = std::get_if<Members>(&member.value.data)) {
            read_table(table, std::string(table.name), *members, member.value.at);
            return;
        }
        fail(table.name, member.at,
             fmt::format("found {} called {}; allowed: one table, written as {} on a line of its own",
                         found(member.value), shown(member.key), table.header));
    }

    void read_blocks(const TableEntry& table, const Member& member) {
        const auto* list = std::get_if<List>(&member.value.data);
        if (list == nullptr) {
            fail(table.name, member.at,
                 fmt::format("found {} called {}; allowed: any number of blocks, each written as {} on a "
                             "line of its own",
                             found(member.value), shown(member.key), table.header));
            return;
        }
        const bool is_vary = table.name == "vary";
        const std::size_t most = is_vary ? most_vary_blocks : most_posts;
        if (list->size() > most) {
            fail(table.name, member.at,
                 fmt::format("found {} blocks {}; allowed: at most {}", list->size(), table.header, most));
            return;
        }
        for (std::size_t i = 0; i < list->size(); ++i) read_block(table, (*list)[i], i + 1);
        (is_vary ? reading_.vary_blocks : reading_.posts) = list->size();
    }

    void read_block(const TableEntry& table, const Value& block, std::size_t number) {
        const std::string prefix = fmt::format("{}[{}]", table.name, number);
        const auto* members = std::get_if<Members>(&block.data);
        if (members == nullptr) {
            fail(prefix, block.at,
                 fmt::format("found {} in the list {}; allowed: blocks written as {}", found(block),
                             table.name, table.header));
        } else {
            read_table(table, prefix, *members, block.at);
        }
    }

    // `prefix` is "patch" or "post[2]".
    void read_table(const TableEntry& table, const std::string& prefix, const Members& members,
                    Position header) {
        std::vector<std::string_view> known;
        for (const Key& key : case_keys()) {
            if (key.table == table.name) known.push_back(key.name);
        }
        for (const Member& member : members) {
            if (problems_.full()) return;
            if (std::ranges::find(known, member.key) == known.end()) {
                fail(prefix, member.at,
                     unknown(member.key, table.name, fmt::format("in {}", table.header), known));
            }
        }
        if (table.name == "vary") return;
        for (const Key& key : case_keys()) {
            if (key.table != table.name) continue;
            const Member* member = find(members, key.name);
            const std::string full = fmt::format("{}.{}", prefix, key.name);
            if (key.feed.empty() || fits_feed(key, full, member)) read_key(key, full, member, header);
        }
    }

    // The table of keys names feed.kind before the keys that depend on it.
    bool fits_feed(const Key& key, std::string_view full, const Member* member) {
        const Checked* kind = reading_.find("feed.kind");
        if (kind == nullptr) return false;
        if (kind->text == key.feed) return true;
        // "width" belongs to one kind only, and so does every other key that depends on it.
        if (member != nullptr) {
            fail(full, member->at,
                 fmt::format("{} belongs to a feed of kind \"{}\", but feed.kind is \"{}\" at {}", full,
                             key.feed, kind->text, text(kind->at)));
        }
        return false;
    }

    void read_key(const Key& key, const std::string& full, const Member* member, Position header) {
        if (member != nullptr) {
            Outcome outcome = check_value(key, full, member->value);
            if (const auto* bad = std::get_if<std::vector<CaseProblem>>(&outcome)) {
                reading_.failed.insert(full);
                problems_.add(*bad);
            } else {
                reading_.values.emplace(full, std::get<Checked>(std::move(outcome)));
            }
            return;
        }
        if (key.fallback == required) {
            const auto kind = dimension(key.type);
            fail(full, header,
                 fmt::format("{} is missing; required: {}{}", full,
                             kind ? fmt::format("a {} of ", name(*kind)) : "", allowed(key)));
        } else if (key.fallback != none && key.fallback != derived) {
            reading_.values.emplace(full, default_of(key, full, header));
        }
    }

    static Checked default_of(const Key& key, std::string_view full, Position header) {
        Value value{header, std::string(key.fallback)};
        if (key.type == KeyType::number) value.data = std::stod(std::string(key.fallback));
        auto checked = std::get<Checked>(check_value(key, full, value));
        checked.given = false;
        return checked;
    }

    void exclude(const std::string& metal, const std::string& conductivity) {
        const Checked* named_metal = reading_.find(metal);
        const Checked* number = reading_.find(conductivity);
        if (number == nullptr || named_metal == nullptr) return;
        if (named_metal->given) {
            fail(conductivity, number->at,
                 fmt::format("{} and {} (\"{}\" at {}) exclude each other; give one of them", conductivity,
                             metal, named_metal->text, text(named_metal->at)));
        } else {
            reading_.values.erase(metal);
        }
    }

    const Members& document_;
    Reading reading_;
    ProblemList problems_;
};

}  // namespace

void ProblemList::add(Position at, std::string message) {
    if (!full()) problems_.push_back({at.line, at.column, std::move(message)});
}

void ProblemList::add(const std::vector<CaseProblem>& problems) {
    for (const CaseProblem& problem : problems) add({problem.line, problem.column}, problem.message);
}

bool ProblemList::full() const {
    return problems_.size() >= most_problems;
}

std::vector<CaseProblem> ProblemList::sorted() const {
    std::vector<CaseProblem> list = problems_;
    std::ranges::stable_sort(list, {}, [](const CaseProblem& p) { return Position{p.line, p.column}; });
    if (full()) {
        list.push_back(
            {list.back().line, list.back().column,
             fmt::format("these are the first {} problems; there may be more behind them", most_problems)});
    }
    return list;
}

const Checked* Reading::find(std::string_view path) const {
    const auto value = values.find(path);
    return value == values.end() ? nullptr : &value->second;
}

double Reading::number(std::string_view path) const {
    const Checked* value = find(path);
    assert(value != nullptr);
    return value->number;
}

std::string named(const Reading& reading, std::string_view path) {
    const Checked* value = reading.find(path);
    if (value == nullptr) return std::string(path);
    const Key* key = find_key(path.substr(0, path.find_first_of("[.")), path.substr(path.rfind('.') + 1));
    const bool quoted = key != nullptr && key->type != KeyType::number && key->type != KeyType::count;
    const std::string echo = quoted ? shown(value->text) : value->text;
    return value->given ? fmt::format("{} = {} at {}", path, echo, text(value->at))
                        : fmt::format("{} = {} by default", path, echo);
}

Reading read_keys(const Members& document) {
    return Reader(document).reading();
}

}  // namespace panelwright::io
