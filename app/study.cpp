#include "app/study.hpp"

#include <fmt/format.h>
#include <omp.h>

#include <algorithm>
#include <chrono>
#include <condition_variable>
#include <exception>
#include <mutex>
#include <new>
#include <optional>
#include <thread>
#include <utility>

#include "app/atomic_file.hpp"
#include "app/exit_status.hpp"
#include "app/progress.hpp"
#include "app/provenance.hpp"
#include "app/solve.hpp"
#include "io/file.hpp"
#include "io/result_file.hpp"

namespace panelwright::app {
namespace {

constexpr std::chrono::seconds between_tables{5};
constexpr std::chrono::milliseconds between_looks{100};

/// The messages of a case error on one line.
std::string one_line(const io::CaseError& error) {
    std::string text;
    for (const io::CaseProblem& problem : error.problems())
        text += (text.empty() ? "" : "; ") + problem.message;
    return text;
}

class StudyRun {
  public:
    StudyRun(const io::Case& study, const ResultsFolder& folder, StopSignals& signals)
        : study_(study), folder_(folder), signals_(signals), rows_(design_rows(study)) {
        count_.total = rows_.size();
    }

    StudyOutcome run(int threads) {
        save_table();
        {
            std::vector<std::jthread> workers;
            const std::size_t wanted = std::min(rows_.size(), static_cast<std::size_t>(threads));
            working_ = wanted;
            for (std::size_t n = 0; n < wanted; ++n) workers.emplace_back([this] { work(); });
            watch();
        }
        progress_.finish(count_);
        if (fault_) {
            save_table_if_possible();
            std::rethrow_exception(fault_);
        }
        save_table();
        return {rows_, stop_};
    }

  private:
    /// What a worker does: one design after the other until none is left or the run stops.
    void work() {
        omp_set_num_threads(1);
        try {
            while (const std::optional<DesignRow> row = next()) attempt(*row);
        } catch (...) {
            const std::lock_guard lock(mutex_);
            if (!fault_) fault_ = std::current_exception();
            stop_ = true;
        }
        const std::lock_guard lock(mutex_);
        --working_;
        finished_.notify_all();
    }

    /// Shows progress and saves the table now and then, until all workers have finished.
    void watch() {
        auto saved = std::chrono::steady_clock::now();
        std::unique_lock lock(mutex_);
        while (working_ > 0) {
            finished_.wait_for(lock, between_looks);
            if (signals_.requested() && next_ < rows_.size()) stop_ = true;
            progress_.show(count_);
            if (stop_ || std::chrono::steady_clock::now() - saved < between_tables) continue;
            const std::string table = designs_csv(study_, rows_);
            lock.unlock();
            try {
                write_table(table);
            } catch (...) {
                lock.lock();
                if (!fault_) fault_ = std::current_exception();
                stop_ = true;
                continue;
            }
            saved = std::chrono::steady_clock::now();
            lock.lock();
        }
    }

    /// The next design to do, or nothing.
    std::optional<DesignRow> next() {
        const std::lock_guard lock(mutex_);
        if (next_ < rows_.size() && signals_.requested()) stop_ = true;
        if (stop_ || next_ == rows_.size()) return std::nullopt;
        return rows_[next_++];
    }

    /// Does one design. Only faults of the whole run leave by an exception.
    void attempt(DesignRow row) {
        bool reused = false;
        try {
            const io::Case design = io::design(study_, row.number - 1);
            if (const std::optional<solver::Result> stored = earlier(row.number, design)) {
                set_result(row, *stored);
                reused = true;
            } else {
                set_result(row, solve_and_save(row.number, design));
            }
        } catch (const io::CaseError& error) {
            fail(row, one_line(error));
        } catch (const SolveError& error) {
            fail(row, error.what());
        } catch (const std::bad_alloc&) {
            fail(row, "not enough memory");
        }
        const std::lock_guard lock(mutex_);
        ++(row.status == DesignStatus::failed ? count_.failed : reused ? count_.reused : count_.solved);
        const std::size_t place = row.number - 1;
        rows_[place] = std::move(row);
    }

    void fail(DesignRow& row, std::string reason) {
        row.status = DesignStatus::failed;
        row.reason = std::move(reason);
        // A file of an older program must not look like the answer to this run.
        std::error_code ignored;
        std::filesystem::remove(folder_.design(row.number), ignored);
    }

    /// The stored result of the design, when it is of the same case and from the same program.
    std::optional<solver::Result> earlier(std::size_t number, const io::Case& design) {
        const std::filesystem::path path = folder_.design(number);
        if (!std::filesystem::exists(path)) return std::nullopt;
        try {
            const std::lock_guard lock(hdf5_);
            io::StoredResult stored = io::read_result(path);
            if (!same_program(stored.provenance) || stored.result.case_resolved != design.resolved)
                return std::nullopt;
            return std::move(stored.result);
        } catch (const io::FileError&) {
            return std::nullopt;  // damaged: it is made anew
        }
    }

    solver::Result solve_and_save(std::size_t number, const io::Case& design) {
        solver::Result result = empty_result(design);
        for (const solver::Method method : design.methods) result.methods.push_back(solve(design, method));
        const auto whole = signals_.hold_off();
        commit_file(folder_.design(number), [&](const std::filesystem::path& path) {
            const std::lock_guard lock(hdf5_);
            io::write_result(path, result, provenance(1));
        });
        return result;
    }

    void save_table_if_possible() {
        try {
            save_table();
        } catch (const io::FileError&) {
            return;  // the fault that ended the run tells more
        }
    }

    void save_table() { write_table(designs_csv(study_, rows_)); }

    void write_table(const std::string& table) {
        const auto whole = signals_.hold_off();
        commit_file(folder_.designs_table(),
                    [&](const std::filesystem::path& path) { io::write_file(path, table); });
    }

    const io::Case& study_;
    const ResultsFolder& folder_;
    StopSignals& signals_;
    Progress progress_;

    std::mutex hdf5_;  // the library is not always built for several threads

    std::mutex mutex_;  // guards everything below
    std::condition_variable finished_;
    std::vector<DesignRow> rows_;
    std::size_t next_ = 0;
    std::size_t working_ = 0;
    Count count_;
    bool stop_ = false;
    std::exception_ptr fault_;
};

}  // namespace

StudyOutcome run_study(const io::Case& study, const ResultsFolder& folder, int threads,
                       StopSignals& signals) {
    std::error_code error;
    std::filesystem::create_directories(folder.designs(), error);
    if (error) throw io::FileError(fmt::format("{}: {}", folder.designs().string(), error.message()));
    return StudyRun(study, folder, signals).run(threads);
}

}  // namespace panelwright::app
