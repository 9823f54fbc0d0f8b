/// How far a study has come, on standard error.
#pragma once

#include <chrono>
#include <cstddef>
#include <optional>
#include <string>

namespace panelwright::app {

/// How many designs are where.
struct Count {
    std::size_t total = 0;
    std::size_t reused = 0;  ///< found done from an earlier run
    std::size_t solved = 0;  ///< done in this run
    std::size_t failed = 0;
};

/// Time left [s], from the time that this run took for the designs it tried; nothing before the first.
std::optional<double> time_left(const Count& count, double seconds);

/// "1 h 02 min", "3 min 20 s", "12 s"
std::string shown_duration(double seconds);

/// Shows progress: a bar that is redrawn on a terminal, lines with the time of day elsewhere, at most one
/// every five seconds.
class Progress {
  public:
    Progress();

    /// Shows `count` if it is time to.
    void show(const Count& count);

    /// Shows the last state and ends the line.
    void finish(const Count& count);

  private:
    using Clock = std::chrono::steady_clock;

    double seconds() const;
    void draw(const Count& count) const;

    Clock::time_point start_ = Clock::now();
    Clock::time_point last_ = Clock::now();
    bool terminal_;
};

}  // namespace panelwright::app
