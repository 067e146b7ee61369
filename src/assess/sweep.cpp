#include "stillcoat/assess/sweep.hpp"

#include <algorithm>
#include <atomic>
#include <chrono>
#include <exception>
#include <mutex>
#include <system_error>
#include <thread>

#include "assess/sweep_axis.hpp"
#include "assess/sweep_outcomes.hpp"

namespace stillcoat::assess {
namespace {

/// Why a result of a mirror is absent.
std::string lack_of(const Appraisal& appraisal) {
    for (const PartView& view : appraisal.part) {
        if (!view.missing.empty()) return "the whole part is not computed: " + view.missing;
        if (!view.absorptance_missing.empty()) {
            return "absorptance of the whole part not known: " + view.absorptance_missing;
        }
    }
    for (const Face& face : appraisal.faces) {
        for (const NoiseTerm& term : face.noise.terms) {
            if (!term.missing.empty()) return term.title + " not computed: " + term.missing;
        }
    }
    return "the reflection phase is not defined";
}

}  // namespace

std::size_t SweepPlan::size() const {
    std::size_t count = 1;
    for (const SweepAxis& axis : axes) count *= axis.values.size();
    return count;
}

double SweepPlan::value(std::size_t axis, std::size_t point) const {
    for (std::size_t later = axes.size() - 1; later > axis; --later) {
        point /= axes[later].values.size();
    }
    return axes[axis].values[point % axes[axis].values.size()];
}

namespace {

/// The mirror of one point.
Appraisal appraisal_at(const stack::Design& design, const materials::Library& library,
                       const SweepPlan& plan, std::size_t point) {
    stack::Design varied = design;
    varied.band.from = varied.band.to = plan.frequency;
    varied.band.spot = {plan.frequency};
    std::optional<materials::Library> own;  // a copy, when a material's value varies
    for (std::size_t axis = 0; axis < plan.axes.size(); ++axis) {
        put_value(plan.axes[axis], plan.value(axis, point), library, varied, own);
    }
    Scope scope{false, false, false};
    scope.noise = std::any_of(plan.outcomes.begin(), plan.outcomes.end(),
                              [](const Outcome& outcome) { return outcome.of_noise; });
    Appraisal appraisal = appraise(varied, own ? *own : library, scope);
    appraisal.uses.clear();  // they point into the copy
    return appraisal;
}

void add_new(std::vector<std::string>& list, const std::vector<std::string>& more) {
    for (const std::string& text : more) {
        if (std::find(list.begin(), list.end(), text) == list.end()) list.push_back(text);
    }
}

}  // namespace

SweepRow sweep_row(const stack::Design& design, const materials::Library& library,
                   const SweepPlan& plan, std::size_t point) {
    SweepRow row;
    try {
        const Appraisal appraisal = appraisal_at(design, library, plan, point);
        row.values = outcome_values(design, appraisal, plan.outcomes);
        const bool gap = std::any_of(row.values.begin(), row.values.end(),
                                     [](const auto& value) { return !value.has_value(); });
        if (gap) row.lack = lack_of(appraisal);
    } catch (const core::InputError& error) {
        row.lack = error.problems().front().message;
    } catch (const core::DomainError& error) {
        row.lack = error.what();
    }
    row.values.resize(plan.outcomes.size());
    return row;
}

SweepRemarks sweep_remarks(const stack::Design& design, const materials::Library& library,
                           const SweepPlan& plan) {
    const std::size_t last = plan.axes.back().values.size() - 1;
    SweepRemarks remarks;
    for (const std::size_t point :
         {std::size_t{0}, last, plan.size() - 1 - last, plan.size() - 1}) {
        try {
            const Appraisal appraisal = appraisal_at(design, library, plan, point);
            add_new(remarks.warnings, appraisal.warnings);
            add_new(remarks.analogies, appraisal.analogies);
        } catch (const core::InputError&) {  // the row of this point says why
        } catch (const core::DomainError&) {
        }
    }
    return remarks;
}

namespace {

/// Joins all threads at the latest when it goes, also on the way of an exception.
struct JoinAll {
    std::vector<std::thread>& threads;
    std::atomic<bool>& stop;

    void now() const {
        for (std::thread& thread : threads) {
            if (thread.joinable()) thread.join();
        }
    }
    ~JoinAll() {
        stop = true;
        now();
    }
};

}  // namespace

bool run_sweep(const stack::Design& design, const materials::Library& library,
               const SweepPlan& plan, std::vector<std::optional<SweepRow>>& rows,
               const std::function<bool(std::size_t)>& report) {
    std::vector<std::size_t> open;
    for (std::size_t point = 0; point < rows.size(); ++point) {
        if (!rows[point]) open.push_back(point);
    }
    std::atomic<std::size_t> next{0}, done{rows.size() - open.size()};
    std::atomic<bool> stop{false};
    std::mutex guard;
    std::exception_ptr failure;
    const auto work = [&] {
        try {
            for (std::size_t i; !stop && (i = next++) < open.size();) {
                rows[open[i]] = sweep_row(design, library, plan, open[i]);
                ++done;
            }
        } catch (...) {
            const std::lock_guard<std::mutex> lock(guard);
            if (!failure) failure = std::current_exception();
            stop = true;
        }
    };
    const std::size_t cores = std::max(1U, std::thread::hardware_concurrency());
    std::vector<std::thread> workers;
    const JoinAll joined{workers, stop};
    try {
        for (std::size_t i = 0; i < std::min(cores, open.size()); ++i) workers.emplace_back(work);
    } catch (const std::system_error&) {
        // Fewer threads than cores; without any the calling thread does the work.
        if (workers.empty()) {
            for (; next < open.size() && report(done);) {
                const std::size_t point = open[next++];
                rows[point] = sweep_row(design, library, plan, point);
                ++done;
            }
            return done == rows.size();
        }
    }
    constexpr auto pause = std::chrono::milliseconds(20);
    while (!stop && done < rows.size()) {
        if (!report(done)) stop = true;
        std::this_thread::sleep_for(pause);
    }
    joined.now();
    if (failure) std::rethrow_exception(failure);
    return done == rows.size();
}

}  // namespace stillcoat::assess
