#include <fmt/format.h>

#include <map>
#include <memory>

#include "present/command.hpp"
#include "present/wording.hpp"
#include "stillcoat/present/command_line.hpp"
#include "stillcoat/stack/layer_table.hpp"

/// `stillcoat layers`.

namespace stillcoat::present {
namespace {

struct LayersOptions {
    std::string design;
    std::vector<std::string> materials;
    bool csv = false;
    Output output;
};

void layer_rows(Page& page, const stack::Mirror& coated) {
    std::vector<std::vector<std::string>> rows;
    double total = 0.0;
    for (const stack::MirrorLayer& layer : coated.layers) {
        total += layer.thickness;
        rows.push_back({std::to_string(rows.size() + 1), layer.material,
                        fmt::format("{:.2f}", layer.thickness * 1e9),
                        fmt::format("{:.4f}", layer.quarter_waves),
                        fmt::format("{:.5f}", layer.optical.index.value),
                        layer.optical.extinction_known
                            ? fmt::format("{:.3g}", layer.optical.extinction.value)
                            : "not stated",
                        fmt::format("{:.2f}", total * 1e9)});
    }
    page.table({"no", "material", "nm", "quarter waves", "n", "k", "running total nm"}, rows, 2);
}

void material_totals(Page& page, const stack::Mirror& coated) {
    struct Sum {
        int layers = 0;
        double thickness = 0.0, quarter_waves = 0.0;
    };
    std::map<std::string, Sum> sums;
    std::vector<std::string> order;
    for (const stack::MirrorLayer& layer : coated.layers) {
        if (sums.count(layer.material) == 0) order.push_back(layer.material);
        Sum& sum = sums[layer.material];
        ++sum.layers;
        sum.thickness += layer.thickness;
        sum.quarter_waves += layer.quarter_waves;
    }
    page.heading("Totals by material");
    std::vector<std::vector<std::string>> rows;
    for (const std::string& name : order) {
        const Sum& sum = sums[name];
        rows.push_back({name, std::to_string(sum.layers),
                        fmt::format("{:.2f}", sum.thickness * 1e9),
                        fmt::format("{:.4f}", sum.quarter_waves),
                        fmt::format("{:.2f}", 100.0 * sum.thickness / coated.coating_thickness)});
    }
    page.table({"material", "layers", "nm", "quarter waves", "% of thickness"}, rows);
}

std::string layers_text(const stack::Design& design, const stack::Mirror& coated,
                        const std::vector<std::string>& notes, bool colour) {
    Page page(colour);
    page.heading(design.title + ": layers from the light to the substrate");
    page.line(
        fmt::format("  physical thickness at {:g} K; n, k and quarter waves there, at {:g} nm "
                    "and normal incidence",
                    design.coating.reference_temperature, design.coating.design_wavelength * 1e9));
    layer_rows(page, coated);
    material_totals(page, coated);
    page.line("");
    page.line(fmt::format("  {} on {}: {} in all", count_text(coated.layers.size(), "layer"),
                          coated.substrate, length_text(coated.coating_thickness)));
    for (const std::string& note : notes) page.item(note);
    return page.text();
}

int layers_command(const std::string& program, const LayersOptions& options) {
    materials::Library library = load_library(program, options.materials);
    const stack::Design design = load_design(options.design, library);
    stack::Ledger ledger;
    const stack::Mirror coated = stack::as_coated(design, library, ledger);
    options.output.write(
        options.csv ? stack::layer_table(coated)
                    : layers_text(design, coated, ledger.notes(), options.output.colour()));
    return fine;
}

}  // namespace

Command add_layers(CLI::App& app, const std::string& program) {
    const auto options = std::make_shared<LayersOptions>();
    CLI::App* command = app.add_subcommand(
        "layers",
        "List the layers: thickness, quarter waves, indices, totals; as CSV for the coater");
    command->add_option("design", options->design, "the design file; - reads standard input")
        ->type_name("DESIGN.toml")
        ->required();
    command->add_flag("--csv", options->csv,
                      "as a table that [coating] table = \"FILE\" reads back exactly");
    add_folder_option(*command, options->materials);
    add_output_options(*command, options->output);
    command->footer("Example:\n  stillcoat layers mirror.toml --csv --out run17.csv");
    return {command, [=] { return layers_command(program, *options); }};
}

}  // namespace stillcoat::present
