/// Ctrl-C and termination, asked for instead of delivered.
#pragma once

#include <atomic>
#include <csignal>

namespace panelwright::app {

/// While an object of this class lives, SIGINT and SIGTERM wait until somebody asks. Make it before any
/// thread that computes: threads inherit from the one that starts them. So nothing is cut off in the middle
/// of a file.
class StopSignals {
  public:
    StopSignals();
    ~StopSignals();
    StopSignals(const StopSignals&) = delete;
    StopSignals& operator=(const StopSignals&) = delete;

    /// True once a signal has come. May be asked from any thread.
    bool requested();

  private:
    sigset_t waiting_{};
    sigset_t before_{};
    std::atomic<bool> requested_ = false;
};

}  // namespace panelwright::app
