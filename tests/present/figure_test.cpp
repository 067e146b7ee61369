#include "present/figure.hpp"

#include <set>

#include "present/figure_support.hpp"
#include "support/csv.hpp"

namespace {

using namespace stillcoat;
using namespace stillcoat::present;
using namespace stillcoat::test;
using core::Existing;

using Drawing = FigureTest;

/// Draws in all three formats and looks at what any figure must be.
template <typename Picture>
std::string drawn(const Picture& picture, const fs::path& folder) {
    const auto path = [&](const char* name) { return (folder / name).string(); };
    draw(picture, path("a.svg"), Existing::replace);
    draw(picture, path("a.pdf"), Existing::replace);
    draw(picture, path("a.png"), Existing::replace);
    const std::string pdf = content_of(path("a.pdf"));
    EXPECT_EQ(pdf.substr(0, 5), "%PDF-");
    EXPECT_NE(pdf.find("%%EOF", pdf.size() - 10), std::string::npos);
    EXPECT_GT(pdf.size(), 5000u);
    const PngSize size = png_size(content_of(path("a.png")));
    EXPECT_EQ(size.width, 1016u);  // 8.6 cm at 300 dots per inch
    EXPECT_GT(size.height, 700u);
    const std::string svg = content_of(path("a.svg"));
    EXPECT_TRUE(is_well_formed(svg));
    EXPECT_NE(svg.find("width=\"325\""), std::string::npos);  // 8.6 cm at 96 dots per inch
    EXPECT_EQ(content_of(path("a.svg.csv")), figure_data_csv(picture));
    return svg;
}

std::vector<SvgPlot> plots_drawn(const Figure& figure, const fs::path& folder) {
    return svg_plots(drawn(figure, folder));
}

TEST(WellFormedness, IsNotSeenWhereItIsNot) {
    EXPECT_TRUE(is_well_formed("<a><b c='1'/>x &amp; y</a>"));
    for (const char* bad : {"<a>", "<a></b>", "<a>x & y</a>", "<a>x < y</a>", "<a>\x01</a>"}) {
        EXPECT_FALSE(is_well_formed(bad)) << bad;
    }
}

TEST_F(Drawing, NoiseOverFrequencyHasAPathForEachCurve) {
    STILLCOAT_NEEDS_GNUPLOT();
    Figure figure = noise_figure(5);
    figure.curves[0].emphasised = true;
    figure.marks = {{100.0, "100 Hz"}};
    const std::string svg = drawn(figure, folder_);
    const std::vector<SvgPlot> plots = svg_plots(svg);
    ASSERT_EQ(plots.size(), 5u);
    for (std::size_t i = 0; i < plots.size(); ++i) {
        EXPECT_EQ(plots[i].name, "noise " + std::to_string(i + 1));
        EXPECT_EQ(plots[i].vertices, 81);
        EXPECT_EQ(plots[i].starts, 1);
    }
    EXPECT_NE(svg.find(">frequency [Hz]<"), std::string::npos);
    EXPECT_NE(svg.find(">displacement noise [m/√Hz]<"), std::string::npos);
    EXPECT_NE(svg.find(">100 Hz<"), std::string::npos);
    EXPECT_NE(svg.find(">−20</tspan>"), std::string::npos);  // the exponent of a decade, raised
    EXPECT_NE(svg.find("<title>a title</title>"), std::string::npos);
}

TEST_F(Drawing, TwelveCurvesDifferInDashesOrWidthWithoutColour) {
    STILLCOAT_NEEDS_GNUPLOT();
    Figure figure = noise_figure(10);
    add_second_axis(figure, {"share [1]"}, noise_figure(2).curves);
    const std::vector<SvgPlot> plots = plots_drawn(figure, folder_);
    ASSERT_EQ(plots.size(), 12u);
    std::set<std::string> looks;
    std::set<std::string> grey_looks;
    for (const SvgPlot& plot : plots) {
        looks.insert(plot.look);
        grey_looks.insert(std::regex_replace(plot.look, std::regex("stroke='[^']*'"), ""));
    }
    EXPECT_EQ(looks.size(), 12u);
    EXPECT_EQ(grey_looks.size(), 12u);

    const std::vector<SvgPlot> same = plots_drawn(noise_figure(12), folder_);
    grey_looks.clear();
    for (const SvgPlot& plot : same) {
        grey_looks.insert(std::regex_replace(plot.look, std::regex("stroke='[^']*'"), ""));
    }
    EXPECT_EQ(grey_looks.size(), 12u);
}

TEST_F(Drawing, IndexStepsLieBehindTheField) {
    STILLCOAT_NEEDS_GNUPLOT();
    Curve field = curve("field", {}, {});
    for (int i = 0; i <= 410; ++i) {
        field.x.push_back(0.01 * i);
        field.y.push_back(std::pow(std::sin(0.15 * i), 2) * std::exp(-0.005 * i));
    }
    Curve index = curve("index", {}, {});
    for (int layer = 0; layer <= 41; ++layer) {
        index.x.push_back(0.1 * layer);
        index.y.push_back(layer % 2 == 0 ? 2.07 : 1.45);
    }
    index.shape = Shape::steps;
    Figure figure = plain_figure({field});
    add_second_axis(figure, {"refractive index [1]", false, 1.0, 3.0}, {index});
    const std::string svg = drawn(figure, folder_);
    const std::vector<SvgPlot> plots = svg_plots(svg);
    ASSERT_EQ(plots.size(), 2u);
    EXPECT_EQ(plots[0].name, "index");
    EXPECT_EQ(plots[0].vertices, 42 + 41);  // a corner at either end of each of 41 layers
    EXPECT_EQ(plots[1].name, "field");
    EXPECT_EQ(plots[1].vertices, 411);
    EXPECT_NE(svg.find(">refractive index [1]<"), std::string::npos);
}

TEST_F(Drawing, AMapHasColoursContoursAndAScale) {
    STILLCOAT_NEEDS_GNUPLOT();
    const std::string svg = drawn(small_map(), folder_);
    EXPECT_EQ(count_of(svg, "<image"), 1);
    const std::vector<SvgPlot> plots = svg_plots(svg);
    ASSERT_EQ(plots.size(), 3u);
    EXPECT_EQ(plots[0].name, "transmittance [1]");
    EXPECT_EQ(plots[1].name, "lines of equal transmittance [1]");
    // z = 10^(−7 … −0.5): decades −6 … −1, one line each, half of them on dark ground.
    EXPECT_EQ(plots[1].starts, 3);
    EXPECT_EQ(plots[2].starts, 3);
    for (const char* text : {">wavelength [nm]<", ">angle [°]<", ">transmittance [1]<", ">−6<"}) {
        EXPECT_NE(svg.find(text), std::string::npos) << text;
    }
}

TEST_F(Drawing, MapsOfOneRowOfOneCellAndWithGapsAreDrawn) {
    STILLCOAT_NEEDS_GNUPLOT();
    Map map = small_map();
    for (std::size_t i = 0; i < map.z_values.size(); i += 3) map.z_values[i] = 0.0;
    EXPECT_EQ(svg_plots(drawn(map, folder_)).size(), 1u);  // no line through a gap
    map.y_values = {45.0};
    map.z_values.resize(map.x_values.size());
    EXPECT_EQ(count_of(drawn(map, folder_), "<image"), 1);
    map.x_values = {1064.0};
    map.z_values = {-1.0};
    EXPECT_EQ(count_of(drawn(map, folder_), "<image"), 1);
    map.z_values = {1e300};
    EXPECT_EQ(count_of(drawn(map, folder_), "<image"), 1);
}

TEST_F(Drawing, GapsOfALogarithmicAxisStayOpen) {
    STILLCOAT_NEEDS_GNUPLOT();
    Figure figure = plain_figure({curve("gaps", {1, 2, 3, 4, 5, 6, 7}, {1, 2, 0, 4, -5, 6, 7}),
                                  curve("never", {1, 2}, {0, -1})});
    figure.y.logarithmic = true;
    std::vector<SvgPlot> plots = plots_drawn(figure, folder_);
    ASSERT_EQ(plots.size(), 2u);
    EXPECT_EQ(plots[0].name, "gaps");
    EXPECT_EQ(plots[0].starts, 2);  // 1–2 and 6–7
    EXPECT_EQ(plots[0].vertices, 4);
    EXPECT_EQ(plots[1].symbols, 1);  // 4 stands alone
    figure.curves.erase(figure.curves.begin());
    plots = plots_drawn(figure, folder_);
    ASSERT_EQ(plots.size(), 1u);
    EXPECT_EQ(plots[0].vertices, 0);
}

TEST_F(Drawing, ExtremeDataAreDrawn) {
    STILLCOAT_NEEDS_GNUPLOT();
    EXPECT_EQ(plots_drawn(plain_figure({curve("one", {3}, {4})}), folder_)[0].symbols, 1);
    EXPECT_EQ(plots_drawn(plain_figure({curve("zero", {0, 1, 2}, {0, 0, 0})}), folder_)[0].vertices,
              3);
    EXPECT_EQ(plots_drawn(plain_figure({curve("huge", {-1e308, 0, 1e308}, {-1.7e308, 0, 1.7e308})}),
                          folder_)[0]
                  .vertices,
              3);
    EXPECT_EQ(
        plots_drawn(plain_figure({curve("near", {1064, 1064.0000001}, {1, 1 + 2e-15})}), folder_)[0]
            .vertices,
        2);
    Figure figure = plain_figure({curve("log", {5e-324, 1, 1.7e308}, {5e-324, 1, 1.7e308})});
    figure.x.logarithmic = figure.y.logarithmic = true;
    EXPECT_EQ(plots_drawn(figure, folder_)[0].vertices, 3);
    figure = plain_figure({curve("outlier", {0, 1, 2}, {0.5, 1e300, 0.5})});
    figure.y.lower = 0.0;
    figure.y.upper = 1.0;
    EXPECT_GE(plots_drawn(figure, folder_)[0].vertices, 2);
    figure.y.lower = 2.0;
    figure.y.upper.reset();
    figure.curves[0].y = {0.5, 0.6, 0.5};
    EXPECT_EQ(plots_drawn(figure, folder_)[0].vertices, 0);  // all of it is out of sight
}

TEST_F(Drawing, TwentyThousandPointsAreDrawn) {
    STILLCOAT_NEEDS_GNUPLOT();
    Curve many = curve("many", {}, {});
    for (int i = 0; i < 20000; ++i) {
        many.x.push_back(i);
        many.y.push_back(i % 2);  // no two neighbours fall together
    }
    const std::vector<SvgPlot> plots = plots_drawn(plain_figure({many}), folder_);
    ASSERT_EQ(plots.size(), 1u);
    EXPECT_GE(plots[0].vertices, 20000);  // long paths are cut and their ends repeated
    EXPECT_LE(plots[0].vertices, 20200);
}

TEST_F(Drawing, TextComesOutAsWritten) {
    STILLCOAT_NEEDS_GNUPLOT();
    const std::string witness = file("witness");
    const std::string odd = "a_b^2 {c} @d ~e %d %g 'f' \\g $h #i";
    const std::string command = "`touch " + witness + "`";
    Figure figure =
        plain_figure({curve(odd, {0, 1}, {0, 1}), curve("R < T & \"A\"", {0, 1}, {1, 0}),
                      curve(command, {0, 1}, {1, 2}),
                      curve("\"\nsystem('touch " + witness + "')\n#", {0, 1}, {2, 1}),
                      curve("e\nend\xFF\x01", {0, 1}, {3, 1})});
    figure.title = odd + "\n'; !touch " + witness;
    figure.x.title = "x_1 \"10^-20\" [1]";
    figure.marks = {{0.5, "m_1^2"}};
    const std::string svg = drawn(figure, folder_);
    EXPECT_FALSE(fs::exists(witness));
    const std::vector<SvgPlot> plots = svg_plots(svg);
    ASSERT_EQ(plots.size(), 5u);
    EXPECT_EQ(plots[0].name, odd);
    EXPECT_EQ(plots[1].name, "R &lt; T &amp; \"A\"");
    EXPECT_EQ(plots[4].name, "e end\uFFFD ");
    for (const std::string& text :
         {">" + odd + "<", std::string(">x_1 \"10^-20\" [1]<"), std::string(">m_1^2<"),
          std::string(">R &lt; T &amp; \"A\"<")}) {
        EXPECT_NE(svg.find(text), std::string::npos) << text;
    }
}

TEST_F(Drawing, LongTextIsBrokenAndTheUnitKept) {
    STILLCOAT_NEEDS_GNUPLOT();
    std::string words;
    for (int i = 0; i < 80; ++i) words += "word" + std::to_string(i) + " ";
    Figure figure = plain_figure({curve(words, {0, 1}, {0, 1})});
    figure.title = words + std::string(3000, 'x');
    figure.y.title = words + "[m/√Hz]";
    figure.marks = {{0.0, words}, {1.0, words}};
    const std::string svg = drawn(figure, folder_);
    EXPECT_NE(svg.find("… [m/√Hz]<"), std::string::npos);
    EXPECT_NE(svg.find("<title>" + words + std::string(3000, 'x') + "</title>"), std::string::npos);
    EXPECT_EQ(svg_plots(svg)[0].name, words);
    EXPECT_LT(png_size(content_of(file("a.png"))).height, 1300u);
}

TEST_F(Drawing, TheSameFigureGivesTheSameBytes) {
    STILLCOAT_NEEDS_GNUPLOT();
    for (const std::string ending : {".svg", ".pdf", ".png"}) {
        draw(noise_figure(3), file("a" + ending), Existing::replace);
        const std::string first = content_of(file("a" + ending));
        ::usleep(ending == ".pdf" ? 1100000 : 0);  // a PDF file's date counts seconds
        draw(noise_figure(3), file("a" + ending), Existing::replace);
        EXPECT_EQ(first, content_of(file("a" + ending))) << ending;
        draw(noise_figure(4), file("a" + ending), Existing::replace);
        EXPECT_NE(first, content_of(file("a" + ending))) << ending;
    }
}

TEST_F(Drawing, ATitleCannotBreakTheSvg) {
    Figure figure = plain_figure({curve("a]]>b", {1.0, 2.0}, {1.0, 2.0})});
    figure.title = "x ]]> y <g> & \"]]>\"";
    draw(figure, file("a.svg"), core::Existing::replace);
    EXPECT_TRUE(is_well_formed(content_of(file("a.svg"))));
}

TEST_F(Drawing, DataReadBackAsTheSameDoubles) {
    const double third = 1.0 / 3.0;
    Figure figure = plain_figure({curve("a, \"b\"", {0.1, third}, {1e-21 / 3.0, -5e-324}),
                                  curve("c", {0.1, third}, {2.0, 1.7976931348623157e308})});
    add_second_axis(figure, {"index [1]"}, {curve("n", {0.5, 0.7, 0.9}, {1.0, 2.0, 3.0})});
    figure.marks = {{0.25, "edge, first"}};
    std::ofstream(file("a.csv")) << figure_data_csv(figure);
    const std::vector<Row> rows = read_csv(file("a.csv"));
    ASSERT_EQ(rows.size(), 3u);
    EXPECT_EQ(number(rows[1], "depth [µm] of a, \"b\"", 0.0), third);
    EXPECT_EQ(number(rows[0], "a, \"b\": intensity [1]", 0.0), 1e-21 / 3.0);
    EXPECT_EQ(rows[1].at("a, \"b\": intensity [1]"), "-5e-324");
    EXPECT_EQ(number(rows[1], "c: intensity [1]", 0.0), 1.7976931348623157e308);
    EXPECT_EQ(rows[2].at("c: intensity [1]"), "");
    EXPECT_EQ(number(rows[2], "depth [µm] of n", 0.0), 0.9);
    EXPECT_EQ(number(rows[2], "n: index [1]", 0.0), 3.0);
    EXPECT_EQ(rows[0].at("marks"), "edge, first");
    EXPECT_EQ(rows[0].size(), 7u);

    const Map map = small_map();
    std::ofstream(file("b.csv")) << figure_data_csv(map);
    const std::vector<Row> cells = read_csv(file("b.csv"));
    ASSERT_EQ(cells.size(), 108u);
    EXPECT_EQ(number(cells[12], "wavelength [nm]", 0.0), 1000.0);
    EXPECT_EQ(number(cells[12], "angle [°]", 0.0), 10.0);
    EXPECT_EQ(number(cells[107], "transmittance [1]", 0.0), map.z_values[107]);
}

}  // namespace
