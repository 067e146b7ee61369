#pragma once
/// What the tests of figures share: sample figures, a folder of their own, readers of SVG and PNG.

#include <gtest/gtest.h>
#include <unistd.h>

#include <cmath>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <regex>
#include <sstream>
#include <string>
#include <vector>

#include "present/figure.hpp"

namespace stillcoat::test {

namespace fs = std::filesystem;

inline std::string content_of(const fs::path& path) {
    std::ifstream stream(path, std::ios::binary);
    std::stringstream text;
    text << stream.rdbuf();
    return text.str();
}

/// Each test draws into a folder of its own, which goes with it.
class FigureTest : public ::testing::Test {
  protected:
    void SetUp() override {
        static int count = 0;
        folder_ = fs::temp_directory_path() / ("stillcoat-figure-" + std::to_string(::getpid()) +
                                               "-" + std::to_string(++count));
        fs::create_directories(folder_);
        const char* path = std::getenv("PATH");
        search_path_ = path != nullptr ? path : "";
    }
    void TearDown() override {
        ::setenv("PATH", search_path_.c_str(), 1);
        fs::remove_all(folder_);
    }
    std::string file(const std::string& name) const { return (folder_ / name).string(); }
    std::size_t files() const {
        return static_cast<std::size_t>(
            std::distance(fs::directory_iterator(folder_), fs::directory_iterator()));
    }
    /// A program called gnuplot, the only one on the PATH besides the shell that runs it.
    void pretend_gnuplot(const std::string& commands) const {
        const fs::path bin = folder_ / "bin";
        fs::create_directories(bin);
        std::ofstream(bin / "gnuplot") << "#!/bin/sh\n" << commands << "\n";
        fs::permissions(bin / "gnuplot", fs::perms::owner_all);
        ::setenv("PATH", bin.c_str(), 1);
    }

    fs::path folder_;
    std::string search_path_;
};

inline bool gnuplot_is_here() {
    std::stringstream path(std::getenv("PATH") != nullptr ? std::getenv("PATH") : "");
    for (std::string folder; std::getline(path, folder, ':');) {
        if (::access((folder + "/gnuplot").c_str(), X_OK) == 0) return true;
    }
    return false;
}

#define STILLCOAT_NEEDS_GNUPLOT()            \
    if (!stillcoat::test::gnuplot_is_here()) \
    GTEST_SKIP() << "gnuplot (gnuplot-nox) is not installed"

inline present::Curve curve(const std::string& name, std::vector<double> x, std::vector<double> y) {
    present::Curve result;
    result.name = name;
    result.x = std::move(x);
    result.y = std::move(y);
    return result;
}

inline present::Figure plain_figure(std::vector<present::Curve> curves) {
    present::Figure figure;
    figure.title = "a title";
    figure.x.title = "depth [µm]";
    figure.y.title = "intensity [1]";
    figure.curves = std::move(curves);
    return figure;
}

inline void add_second_axis(present::Figure& figure, const present::Axis& axis,
                            const std::vector<present::Curve>& curves) {
    figure.second.emplace();
    figure.second->axis = axis;
    figure.second->curves = curves;
}

/// Noise-like curves of 81 points from 1 Hz to 10 kHz.
inline present::Figure noise_figure(int count) {
    present::Figure figure = plain_figure({});
    figure.x = {"frequency [Hz]", true};
    figure.y = {"displacement noise [m/√Hz]", true};
    for (int k = 0; k < count; ++k) {
        present::Curve noise = curve("noise " + std::to_string(k + 1), {}, {});
        for (int i = 0; i <= 80; ++i) {
            noise.x.push_back(std::pow(10.0, i / 20.0));
            noise.y.push_back(1e-21 * std::pow(1.7, k) * (1.0 + 100.0 / noise.x.back()));
        }
        figure.curves.push_back(noise);
    }
    return figure;
}

inline present::Map small_map() {
    present::Map map;
    map.title = "a map";
    map.x.title = "wavelength [nm]";
    map.y.title = "angle [°]";
    map.z = {"transmittance [1]", true};
    for (int i = 0; i < 12; ++i) map.x_values.push_back(1000.0 + 10.0 * i);
    for (int j = 0; j < 9; ++j) map.y_values.push_back(10.0 * j);
    for (int j = 0; j < 9; ++j) {
        for (int i = 0; i < 12; ++i)
            map.z_values.push_back(std::pow(10.0, -7.0 + 0.3 * i + 0.4 * j));
    }
    return map;
}

/// One plotted thing of an SVG file.
struct SvgPlot {
    std::string name;  ///< as it stands in the file, escaped
    int vertices = 0;  ///< of its paths
    int starts = 0;    ///< paths' "move to"
    int symbols = 0;
    std::string look;  ///< colour, width and dashes
};

inline std::string first_group(const std::string& text, const std::string& pattern) {
    std::smatch match;
    return std::regex_search(text, match, std::regex(pattern)) ? match[1].str() : "";
}

inline int count_of(const std::string& text, const std::string& part) {
    int count = 0;
    for (std::size_t at = text.find(part); at != std::string::npos; at = text.find(part, at + 1)) {
        ++count;
    }
    return count;
}

inline std::vector<SvgPlot> svg_plots(const std::string& svg) {
    const std::string mark = "<g id=\"gnuplot_plot_";
    std::vector<SvgPlot> plots;
    for (std::size_t at = svg.find(mark); at != std::string::npos;) {
        const std::size_t next = svg.find(mark, at + 1);
        const std::size_t end = svg.find("\n\t</g>\n", at);
        const std::string part = svg.substr(at, std::min(next, end) - at);
        SvgPlot plot;
        plot.name = first_group(part, "<title>([^<]*)</title>");
        std::size_t path = part.find("<path");
        while (path != std::string::npos) {
            const std::size_t close = part.find("/>", path);
            const std::string text = part.substr(path, close - path);
            const std::string points = text.substr(text.find(" d='"));
            plot.starts += count_of(points, "M");
            plot.vertices += count_of(points, ",");
            plot.look = first_group(text, "(stroke='[^']*')") +
                        first_group(text, "(stroke-dasharray='[^']*')");
            path = part.find("<path", close);
        }
        std::size_t width = part.rfind("stroke-width");
        if (width != std::string::npos) plot.look += part.substr(width, 19);
        plot.symbols = count_of(part, "<use");
        plots.push_back(plot);
        at = next;
    }
    return plots;
}

/// Whether every element that is opened is closed in its turn, no "&" or "<" stands alone and no
/// control character is in it: what XML asks of a text without a document type.
inline ::testing::AssertionResult is_well_formed(const std::string& xml) {
    static const std::regex reference("&(amp|lt|gt|quot|apos|#[0-9]+|#x[0-9A-Fa-f]+);.*");
    std::vector<std::string> open;
    for (std::size_t i = 0; i < xml.size(); ++i) {
        const auto byte = static_cast<unsigned char>(xml[i]);
        if (byte < 0x20 && byte != '\n' && byte != '\t' && byte != '\r') {
            return ::testing::AssertionFailure() << "control character at " << i;
        }
        if (byte == '&' &&
            !std::regex_match(xml.substr(i, 10).substr(0, xml.find('\n', i) - i), reference)) {
            return ::testing::AssertionFailure() << "bare & at " << xml.substr(i, 30);
        }
        if (byte != '<') continue;
        const std::size_t end = xml.find('>', i);
        if (end == std::string::npos) return ::testing::AssertionFailure() << "open tag";
        const std::string tag = xml.substr(i + 1, end - i - 1);
        i = end;
        if (tag[0] == '?' || tag[0] == '!' || tag.back() == '/') continue;
        if (tag.find('<') != std::string::npos)
            return ::testing::AssertionFailure() << "bare < in " << tag;
        if (tag[0] != '/') {
            open.push_back(tag.substr(0, tag.find_first_of(" \t\n")));
        } else if (open.empty() || open.back() != tag.substr(1)) {
            return ::testing::AssertionFailure() << "closes " << tag;
        } else {
            open.pop_back();
        }
    }
    if (!open.empty()) return ::testing::AssertionFailure() << "never closed: " << open.back();
    return ::testing::AssertionSuccess();
}

struct PngSize {
    unsigned width = 0;
    unsigned height = 0;
};

inline PngSize png_size(const std::string& png) {
    if (png.size() < 24 || png.substr(1, 3) != "PNG" || png.substr(12, 4) != "IHDR") return {};
    const auto number = [&](std::size_t at) {
        unsigned value = 0;
        for (std::size_t i = 0; i < 4; ++i)
            value = value << 8U | static_cast<unsigned char>(png[at + i]);
        return value;
    };
    return {number(16), number(20)};
}

}  // namespace stillcoat::test
