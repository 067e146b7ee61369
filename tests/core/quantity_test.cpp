#include "stillcoat/core/quantity.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace {

using namespace stillcoat::core;

double value(const std::string& text, const QuantityKind& kind) {
    const QuantityReading reading = read_quantity(text, kind);
    EXPECT_TRUE(reading.ok) << text << ": " << reading.failure.message;
    return reading.value;
}

void expect_refused(const std::string& text, const QuantityKind& kind, const std::string& message) {
    const QuantityReading reading = read_quantity(text, kind);
    EXPECT_FALSE(reading.ok) << text;
    EXPECT_EQ(reading.failure.message, message);
}

TEST(Quantity, IsReadIntoSi) {
    EXPECT_DOUBLE_EQ(value("1397 nm", kind::length), 1397e-9);
    EXPECT_DOUBLE_EQ(value("0.42 mm", kind::length), 0.42e-3);
    EXPECT_DOUBLE_EQ(value("0.42mm", kind::length), 0.42e-3);
    EXPECT_DOUBLE_EQ(value("5 µm", kind::length), 5e-6);
    EXPECT_DOUBLE_EQ(value("72 GPa", kind::pressure), 72e9);
    EXPECT_DOUBLE_EQ(value("1.38 W/(m K)", kind::thermal_conductivity), 1.38);
    EXPECT_DOUBLE_EQ(value("0.74 J/(g K)", kind::specific_heat), 740.0);
    EXPECT_DOUBLE_EQ(value("5 ppm", kind::number), 5e-6);
    EXPECT_DOUBLE_EQ(value("2 %", kind::number), 0.02);
    EXPECT_DOUBLE_EQ(value("-30 dB", kind::number), 1e-3);
    EXPECT_DOUBLE_EQ(value("0.5", kind::number), 0.5);
    EXPECT_NEAR(value("21.85 degC", kind::temperature), 295.0, 1e-12);
    EXPECT_NEAR(value("180 deg", kind::angle), 3.14159265358979, 1e-14);
}

TEST(Quantity, WithoutUnitIsRefused) {
    expect_refused("0.42", kind::length, "\"0.42\" has no unit");
    expect_refused("", kind::length, "an empty text where a length is expected");
    expect_refused("   ", kind::length, "an empty text where a length is expected");
}

TEST(Quantity, WithAWrongKindOfUnitIsRefused) {
    expect_refused("5 K", kind::length, "\"K\" is not a unit of length");
    expect_refused("5 rad/s", kind::frequency, "\"rad/s\" is not a unit of frequency");
    for (const char* unit : {"cycle/s", "turn/s", "rps", "rpm", "deg/s", "revolution/minute"}) {
        // UDUNITS-2 would read 5 of them as 31.4 Hz, 0.52 Hz, 0.087 Hz …
        expect_refused("5 " + std::string(unit), kind::frequency,
                       "\"" + std::string(unit) + "\" is not a unit of frequency");
    }
    expect_refused("333 1/m", kind::length, "\"1/m\" is not a unit of length");
    for (const char* text : {"1064 nm 2", "1064 nm (2)", "1064 nm.2", "1064 2nm"}) {
        EXPECT_FALSE(read_quantity(text, kind::length).ok) << text;
    }
    for (const char* text : {"0.1 sr", "0.1 rad2", "1 rad.sr"}) {
        EXPECT_FALSE(read_quantity(text, kind::angle).ok) << text;
    }
    EXPECT_DOUBLE_EQ(value("5 W m-1 K-1", kind::thermal_conductivity), 5.0);
    EXPECT_DOUBLE_EQ(value("5 kg m^-3", kind::density), 5.0);
    expect_refused("1 s", kind::frequency, "\"s\" is not a unit of frequency");
    expect_refused("1 K", kind::per_kelvin, "\"K\" is not a unit of change per kelvin");
    expect_refused("1 turn", kind::number, "\"turn\" is not a unit of pure number");
    expect_refused("5 %", kind::angle, "\"%\" is not a unit of angle");
    expect_refused("5 nm2", kind::length, "\"nm2\" is not a unit of length");
}

TEST(Quantity, ThatIsNoFiniteNumberIsRefused) {
    expect_refused("nan nm", kind::length, "length is not a finite number");
    expect_refused("inf nm", kind::length, "length is not a finite number");
    expect_refused("1e400 nm", kind::length,
                   "the number in \"1e400 nm\" is beyond what can be held");
    expect_refused("1e308 km", kind::length, "length is not a finite number");
    expect_refused("nan", kind::number, "\"nan\" has no unit");
}

TEST(Quantity, WithTextThatIsNoUnitIsRefused) {
    expect_refused("ten nm", kind::length, "\"ten nm\" does not begin with a number");
    expect_refused("5 furlongish", kind::length, "\"furlongish\" is not a known unit");
    expect_refused("5 3 nm", kind::length, "\"3 nm\" is not a unit");
    expect_refused("5 nm @ 3", kind::length, "\"nm @ 3\" is not a unit");
}

TEST(UsualUnits, AreAllAccepted) {
    int units = 0;
    for (const UsualUnits& usual : usual_units()) {
        for (const std::string& unit : usual.units) {
            ++units;
            const QuantityReading reading = read_quantity("1 " + unit, usual.kind);
            EXPECT_TRUE(reading.ok) << unit << ": " << reading.failure.message;
            EXPECT_TRUE(std::isfinite(reading.value) && reading.value > 0.0) << unit;
        }
    }
    EXPECT_GT(units, 30);
}

TEST(Quantity, OfATableHasTheUnitOfItsColumn) {
    EXPECT_NEAR(read_quantity(5.0, "degC", kind::temperature).value, 278.15, 1e-12);
}

}  // namespace
