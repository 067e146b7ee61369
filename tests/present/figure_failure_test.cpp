#include <limits>
#include <stdexcept>

#include "present/figure_support.hpp"
#include "stillcoat/core/errors.hpp"

namespace {

using namespace stillcoat;
using namespace stillcoat::present;
using namespace stillcoat::test;
using core::Existing;
using core::InputError;

using FigureFailure = FigureTest;

Figure line() { return plain_figure({curve("a", {0, 1}, {0, 1})}); }

/// What draw says when it refuses; empty when it does not.
template <typename Picture>
std::string refusal(const Picture& picture, const std::string& path, Existing existing) {
    try {
        draw(picture, path, existing);
    } catch (const InputError& error) {
        std::string text;
        for (const core::Problem& problem : error.problems()) text += core::describe(problem);
        return text;
    }
    return "";
}

void expect_part(const std::string& text, const std::string& part) {
    EXPECT_NE(text.find(part), std::string::npos) << "\"" << part << "\" is not in: " << text;
}

TEST_F(FigureFailure, AnotherEndingIsRefusedAndTheThreeAreNamed) {
    for (const std::string name : {"a.jpg", "a", "a.SVG", ".svg", "a.svg.gz"}) {
        const std::string text = refusal(line(), file(name), Existing::replace);
        for (const char* ending : {".svg", ".pdf", ".png"}) expect_part(text, ending);
    }
    expect_part(refusal(line(), "-", Existing::replace), ".png");
    expect_part(refusal(line(), "", Existing::replace), ".png");
    EXPECT_EQ(files(), 0u);
}

TEST_F(FigureFailure, AFileThatIsKeptIsSeenBeforeGnuplotStarts) {
    pretend_gnuplot(": > '" + file("started") + "'; echo picture");
    std::ofstream(file("a.svg")) << "mine";
    expect_part(refusal(line(), file("a.svg"), Existing::keep), "a.svg: exists already");
    EXPECT_FALSE(fs::exists(file("a.svg.csv")));
    std::ofstream(file("b.pdf.csv")) << "mine";
    expect_part(refusal(line(), file("b.pdf"), Existing::keep), "b.pdf.csv: exists already");
    EXPECT_FALSE(fs::exists(file("b.pdf")));
    fs::create_directory(file("c.png"));
    expect_part(refusal(line(), file("c.png"), Existing::replace), "is a directory");
    EXPECT_EQ(content_of(file("a.svg")) + content_of(file("b.pdf.csv")), "minemine");
    EXPECT_FALSE(fs::exists(file("started")));
    EXPECT_EQ(refusal(line(), file("a.svg"), Existing::replace), "");
    EXPECT_TRUE(fs::exists(file("started")));
    EXPECT_EQ(content_of(file("a.svg")), "picture\n");
}

TEST_F(FigureFailure, WithoutGnuplotItSaysWhatToInstall) {
    ::setenv("PATH", folder_.c_str(), 1);
    const std::string text = refusal(line(), file("a.svg"), Existing::keep);
    expect_part(text, "gnuplot is not on the PATH");
    expect_part(text, "gnuplot-nox");
    EXPECT_EQ(files(), 0u);
}

TEST_F(FigureFailure, WhatGnuplotSaysIsPassedOn) {
    pretend_gnuplot("echo 'no such terminal' >&2; echo half a picture; exit 3");
    expect_part(refusal(line(), file("a.svg"), Existing::keep), "no such terminal");
    pretend_gnuplot("exit 0");
    expect_part(refusal(line(), file("a.svg"), Existing::keep), "it gave no reason");
    pretend_gnuplot("kill -9 $$");
    expect_part(refusal(line(), file("a.svg"), Existing::keep), "signal 9");
    // It ends without reading: more data than a pipe holds must not end us.
    Curve many = curve("many", {}, {});
    for (int i = 0; i < 20000; ++i) {
        many.x.push_back(i);
        many.y.push_back(i * i);
    }
    pretend_gnuplot("exit 1");
    expect_part(refusal(plain_figure({many}), file("a.svg"), Existing::keep), "gnuplot failed");
    // It writes more than a pipe holds before it reads.
    pretend_gnuplot(
        "i=0; while [ $i -lt 20000 ]; do echo 'a line of text' >&2; i=$((i+1)); done; exit 1");
    expect_part(refusal(line(), file("a.svg"), Existing::keep), "a line of text");
    EXPECT_EQ(files(), 1u);  // the folder of the pretended program
}

TEST_F(FigureFailure, WhenThePictureCannotBeWrittenTheDataAreNotLeft) {
    // gnuplot's run is when somebody else takes the name.
    pretend_gnuplot(": > '" + file("a.svg") + "'; echo picture");
    expect_part(refusal(line(), file("a.svg"), Existing::keep), "exists already");
    EXPECT_FALSE(fs::exists(file("a.svg.csv")));
    pretend_gnuplot("echo picture");
    expect_part(refusal(line(), file("none/b.svg"), Existing::keep), "cannot create");
    EXPECT_FALSE(fs::exists(file("none")));
}

TEST_F(FigureFailure, NobodysStartUpFileIsRead) {
    STILLCOAT_NEEDS_GNUPLOT();
    const char* home = std::getenv("HOME");
    const std::string before = home != nullptr ? home : "";
    std::ofstream(file(".gnuplot")) << "exit status 7\n";
    ::setenv("HOME", folder_.c_str(), 1);
    EXPECT_EQ(refusal(line(), file("a.svg"), Existing::keep), "");
    ::setenv("HOME", before.c_str(), 1);
}

TEST_F(FigureFailure, MistakesOfTheCallerAreLogicErrors) {
    const double nan = std::numeric_limits<double>::quiet_NaN();
    const double infinity = std::numeric_limits<double>::infinity();
    std::vector<Figure> figures;
    const auto wrong = [&](auto change) {
        figures.push_back(line());
        change(figures.back());
    };
    wrong([&](Figure& f) { f.curves[0].y[1] = nan; });
    wrong([&](Figure& f) { f.curves[0].x[0] = -infinity; });
    wrong([&](Figure& f) { f.marks = {{nan, "m"}}; });
    wrong([&](Figure& f) { f.x.lower = infinity; });
    wrong([](Figure& f) { f.curves.clear(); });
    wrong([](Figure& f) { f.curves[0].x.push_back(2.0); });
    wrong([](Figure& f) { f.curves[0] = curve("empty", {}, {}); });
    wrong([](Figure& f) { f.curves.assign(most_curves + 1, f.curves[0]); });
    wrong([](Figure& f) {
        add_second_axis(f, {"n [1]"}, std::vector<Curve>(most_curves, f.curves[0]));
    });
    wrong([](Figure& f) { f.y.title = ""; });
    wrong([](Figure& f) { f.y.lower = f.y.upper = 1.0; });
    wrong([](Figure& f) { f.y = {"y [1]", true, 0.0, 1.0}; });
    for (std::size_t i = 0; i < figures.size(); ++i) {
        EXPECT_THROW(draw(figures[i], file("a.svg"), Existing::keep), std::logic_error) << i;
        EXPECT_THROW(figure_data_csv(figures[i]), std::logic_error) << i;
    }
    std::vector<Map> maps(4, small_map());
    maps[0].z_values[5] = nan;
    maps[1].z_values.pop_back();
    maps[2].x_values[3] = maps[2].x_values[2];
    maps[3].x_values.clear();
    for (const Map& map : maps) {
        EXPECT_THROW(draw(map, file("a.svg"), Existing::keep), std::logic_error);
    }
    EXPECT_EQ(files(), 0u);
}

}  // namespace
