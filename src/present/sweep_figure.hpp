#pragma once
/// The picture of a sweep: curves over one quantity, colours over two.

#include <string>

#include "present/sweep_output.hpp"
#include "stillcoat/core/file_writer.hpp"

namespace stillcoat::present {

/// Refuses, before anything is computed, what cannot be drawn or written.
/// @param others files of the same command that must not be overwritten
/// @throws core::InputError
void check_sweep_figure(const assess::SweepPlan& plan, const std::string& path,
                        const std::vector<std::string>& others, core::Existing existing);

/// Spectral densities are drawn as amplitudes; axes become logarithmic where values span more than
/// a factor of 100. Points without a value leave gaps.
void draw_sweep(const stack::Design& design, const assess::SweepPlan& plan, const SweepRows& rows,
                const std::string& path, core::Existing existing);

}  // namespace stillcoat::present
