#include "app/stop_signals.hpp"

#include <unistd.h>

#include <ctime>
#include <utility>

#include "app/console.hpp"
#include "app/exit_status.hpp"

namespace panelwright::app {

StopSignals::StopSignals() {
    sigemptyset(&waiting_);
    sigaddset(&waiting_, SIGINT);
    sigaddset(&waiting_, SIGTERM);
    pthread_sigmask(SIG_BLOCK, &waiting_, &before_);
    watcher_ = std::jthread([this](const std::stop_token& stop) { watch(stop); });
}

StopSignals::~StopSignals() {
    watcher_.request_stop();
    pthread_kill(watcher_.native_handle(), SIGTERM);  // wakes the watcher, which sees that it is to stop
    watcher_.join();
    // A signal repeated by an impatient hand must not end the program once it has stopped in good order.
    const timespec at_once{0, 0};
    while (sigtimedwait(&waiting_, nullptr, &at_once) > 0) continue;
    pthread_sigmask(SIG_SETMASK, &before_, nullptr);
}

bool StopSignals::requested() {
    const timespec at_once{0, 0};
    if (sigtimedwait(&waiting_, nullptr, &at_once) > 0) ++come_;
    return come_ > 0;
}

void StopSignals::end_at(int signals, std::string message) {
    const std::lock_guard lock(mutex_);
    allowed_ = signals;
    message_ = std::move(message);
}

std::shared_lock<std::shared_mutex> StopSignals::hold_off() {
    return std::shared_lock(writing_);
}

void StopSignals::watch(const std::stop_token& stop) {
    // Now and then, because others may take a signal that came, or change how many are allowed.
    const timespec a_while{0, 100'000'000};
    while (!stop.stop_requested()) {
        if (sigtimedwait(&waiting_, nullptr, &a_while) > 0 && !stop.stop_requested()) ++come_;
        if (!stop.stop_requested()) end_if_due();
    }
}

void StopSignals::end_if_due() {
    if (come_ == 0) return;
    const std::unique_lock no_file(writing_);
    const std::lock_guard lock(mutex_);
    if (allowed_ == 0 || come_ < allowed_) return;
    if (isatty(STDERR_FILENO) == 1) tell("\n");  // a progress bar may stand on the line
    tell(message_);
    _exit(static_cast<int>(ExitStatus::stopped));
}

}  // namespace panelwright::app
