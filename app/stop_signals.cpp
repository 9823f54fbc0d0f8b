#include "app/stop_signals.hpp"

#include <ctime>

namespace panelwright::app {

StopSignals::StopSignals() {
    sigemptyset(&waiting_);
    sigaddset(&waiting_, SIGINT);
    sigaddset(&waiting_, SIGTERM);
    pthread_sigmask(SIG_BLOCK, &waiting_, &before_);
}

StopSignals::~StopSignals() {
    // A signal repeated by an impatient hand must not end the program once it has stopped in good order.
    const timespec at_once{0, 0};
    while (sigtimedwait(&waiting_, nullptr, &at_once) > 0) continue;
    pthread_sigmask(SIG_SETMASK, &before_, nullptr);
}

bool StopSignals::requested() {
    const timespec at_once{0, 0};
    if (sigtimedwait(&waiting_, nullptr, &at_once) > 0) requested_ = true;
    return requested_;
}

}  // namespace panelwright::app
