/// Ctrl-C and termination, asked for instead of delivered.
#pragma once

#include <atomic>
#include <csignal>
#include <mutex>
#include <shared_mutex>
#include <string>
#include <thread>

namespace panelwright::app {

/// While an object of this class lives, SIGINT and SIGTERM do not end the program by themselves: it finds out
/// by asking, and after as many signals as `end_at` allows the program ends at once, though never in the
/// middle of a file. Make the object before any thread that computes: threads inherit from the one that
/// starts them.
class StopSignals {
  public:
    StopSignals();
    ~StopSignals();
    StopSignals(const StopSignals&) = delete;
    StopSignals& operator=(const StopSignals&) = delete;

    /// True once a signal has come. May be asked from any thread.
    bool requested();

    /// From now on the program ends, with exit status 4 and `message` on standard error, as soon as `signals`
    /// signals have come and nobody holds the end off. Never before the first call.
    void end_at(int signals, std::string message);

    /// Holds the end off while the returned lock lives: for the time in which a file is written. The holder
    /// must not ask for another.
    [[nodiscard]] std::shared_lock<std::shared_mutex> hold_off();

  private:
    void watch(const std::stop_token& stop);
    void end_if_due();

    sigset_t waiting_{};
    sigset_t before_{};
    std::atomic<int> come_ = 0;
    std::shared_mutex writing_;
    std::mutex mutex_;  // guards the two below
    int allowed_ = 0;   // 0: any number
    std::string message_;
    std::jthread watcher_;  // last: it uses all of the above
};

}  // namespace panelwright::app
