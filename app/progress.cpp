#include "app/progress.hpp"

#include <fmt/chrono.h>
#include <fmt/format.h>
#include <unistd.h>

#include <ctime>

#include "app/console.hpp"

namespace panelwright::app {
namespace {

constexpr std::chrono::milliseconds between_bars{200};
constexpr std::chrono::seconds between_lines{5};
constexpr std::size_t bar_width = 30;

std::size_t finished(const Count& count) {
    return count.reused + count.solved + count.failed;
}

std::string state(const Count& count, double seconds) {
    std::string text = fmt::format("{} of {} designs done", count.reused + count.solved, count.total);
    if (count.failed > 0) text += fmt::format(", {} failed", count.failed);
    if (finished(count) == count.total) return text + fmt::format(", {}", shown_duration(seconds));
    const std::optional<double> left = time_left(count, seconds);
    if (!left) return text;
    return text + fmt::format(", {}{} left", *left < 1.0 ? "" : "about ", shown_duration(*left));
}

}  // namespace

std::optional<double> time_left(const Count& count, double seconds) {
    const std::size_t tried = count.solved + count.failed;
    if (tried == 0) return std::nullopt;
    return seconds * static_cast<double>(count.total - finished(count)) / static_cast<double>(tried);
}

std::string shown_duration(double seconds) {
    if (seconds < 1.0) return "less than 1 s";
    const auto whole = static_cast<long>(seconds + 0.5);
    if (whole < 60) return fmt::format("{} s", whole);
    if (whole < 3600) return fmt::format("{} min {:02} s", whole / 60, whole % 60);
    return fmt::format("{} h {:02} min", whole / 3600, whole % 3600 / 60);
}

Progress::Progress() : terminal_(isatty(STDERR_FILENO) == 1) {}

double Progress::seconds() const {
    return std::chrono::duration<double>(Clock::now() - start_).count();
}

void Progress::show(const Count& count) {
    const auto pause =
        terminal_ ? std::chrono::milliseconds(between_bars) : std::chrono::milliseconds(between_lines);
    if (Clock::now() - last_ < pause) return;
    last_ = Clock::now();
    draw(count);
}

void Progress::finish(const Count& count) {
    draw(count);
    if (terminal_) tell("\n");
}

void Progress::draw(const Count& count) const {
    const std::string text = state(count, seconds());
    if (!terminal_) {
        tell(fmt::format("{:%H:%M:%S}Z {}\n", fmt::gmtime(std::time(nullptr)), text));
        return;
    }
    const std::size_t full = count.total == 0 ? bar_width : bar_width * finished(count) / count.total;
    // The escape sequence clears what a longer text has left behind on the line.
    tell(fmt::format("\r[{:=<{}}{:{}}] {}\x1b[K", "", full, "", bar_width - full, text));
}

}  // namespace panelwright::app
