"""Bad input: each case has its exact message and exit code, and leaves no file behind.

    bad_input.py --list                 names of the cases
    bad_input.py PROGRAM CASE           runs one
A case changes one line of a good design, or is a whole file or command line. `{f}` stands for the file."""
import os
import pathlib
import subprocess
import sys
import tempfile

GOOD = """\
[light]
wavelength = "1064 nm"
[beam]
radius = "1 mm"
[mirror]
substrate = "fused-silica"
[environment]
temperature = "295 K"
[[coating.block]]
layers = [ { material = "tantala-ibs", quarter_waves = 1.0 } ]
"""


def change(old, new):
    assert old in GOOD
    return GOOD.replace(old, new)


TABLE = change("""[[coating.block]]
layers = [ { material = "tantala-ibs", quarter_waves = 1.0 } ]""", """[coating]
table = "t.csv\"""")
LAYER = 'layers = [ { material = "tantala-ibs", quarter_waves = 1.0 } ]'
CASES = {
    "missing-unit": (change('"1 mm"', '"1"'), """\
{f}:4:10: radius in [beam]: "1" has no unit
     4 | radius = "1"
       |          ^^^
       write a length with its unit, for example "0.42 mm\""""),
    "bare-number": (change('"1 mm"', "0.001"), """\
{f}:4:10: radius in [beam] needs a length with a unit, here it is a bare number
     4 | radius = 0.001
       |          ^^^^^
       for example radius = "0.42 mm\""""),
    "wrong-kind-of-unit": (change('"1 mm"', '"1 K"'), """\
{f}:4:10: radius in [beam]: "K" is not a unit of length
     4 | radius = "1 K"
       |          ^^^^^
       write a length with its unit, for example "0.42 mm\""""),
    "unknown-unit": (change('"1 mm"', '"1 mmm"'), """\
{f}:4:10: radius in [beam]: "mmm" is not a known unit
     4 | radius = "1 mmm"
       |          ^^^^^^^
       write a length with its unit, for example "0.42 mm"; `stillcoat units` lists the usual ones"""),
    "unknown-key": (change("radius =", "radios ="), """\
{f}:3:1: radius is missing in [beam]
     3 | [beam]
       | ^^^^^^
       add radius = "0.42 mm"
{f}:4:1: unknown key radios in [beam]
     4 | radios = "1 mm"
       | ^^^^^^
       did you mean radius?
2 problems"""),
    "unknown-table": (GOOD + "[bandd]\nfrom = \"1 Hz\"\n", """\
{f}:11:2: unknown key bandd in the design file
    11 | [bandd]
       |  ^^^^^
       did you mean band?"""),
    "unknown-material": (change("tantala-ibs", "tantalla-ibs"), """\
{f}:10:25: unknown material "tantalla-ibs"
    10 | layers = [ { material = "tantalla-ibs", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^^^^^^^
       did you mean "tantala-ibs"? `stillcoat materials` lists all"""),
    "negative-thickness": (change("quarter_waves = 1.0", 'thickness = "-3 nm"'), """\
{f}:10:52: thickness in layer 1 of [[coating.block]] 1 is "-3 nm"
    10 | layers = [ { material = "tantala-ibs", thickness = "-3 nm" } ]
       |                                                    ^^^^^^^
       it must be from 1e-15 m to 1 m"""),
    "zero-thickness": (change("quarter_waves = 1.0", "quarter_waves = 0"), """\
{f}:10:56: quarter_waves in layer 1 of [[coating.block]] 1 is 0
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 0 } ]
       |                                                        ^
       it must be from 1e-9 to 1e9"""),
    "repeat-zero": (change("layers =", "repeat = 0\nlayers ="), """\
{f}:10:10: repeat in [[coating.block]] 1 is 0
    10 | repeat = 0
       |          ^
       it must be a whole number from 1 to 20000"""),
    "poisson-ratio": (GOOD + '[material.tantala-ibs]\npoisson_ratio = { value = 0.7, source = "x" }\n', """\
{f}:12:27: value in poisson_ratio of tantala-ibs is 0.7
    12 | poisson_ratio = { value = 0.7, source = "x" }
       |                           ^^^
       it must be between -1 and 0.5 (stable isotropic solid)"""),
    "override-without-source": (GOOD + "[material.tantala-ibs]\npoisson_ratio = { value = 0.3 }\n", """\
{f}:12:17: source is missing in poisson_ratio of tantala-ibs
    12 | poisson_ratio = { value = 0.3 }
       |                 ^^^^^^^^^^^^^^^
       add source = "...\""""),
    "wavelength-outside-dispersion": (change("1064 nm", "12 um"), """\
{f}:6:13: refractive index of fused-silica is known for 400–2600 nm only, not at 12000 nm
     6 | substrate = "fused-silica"
       |             ^^^^^^^^^^^^^^
       choose another material, or state refractive_index in [material."fused-silica"]
{f}:10:25: refractive index of tantala-ibs is known for 400–1800 nm only, not at 12000 nm
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^^^^^^
       choose another material, or state refractive_index in [material."tantala-ibs"]
2 problems"""),
    "temperature-outside-index": (change("295 K", "2 K"), """\
{f}:6:13: refractive index of fused-silica at 2 K unknown (its data hold for 30–310 K, its rule for 4–30 K)
     6 | substrate = "fused-silica"
       |             ^^^^^^^^^^^^^^
       choose another material, or state refractive_index in [material."fused-silica"]
{f}:10:25: dn/dT of tantala-ibs at 2 K unknown (its data hold for 283–313 K, its rule for 4–283 K), so its index at the operating temperature is unknown
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^^^^^^
       choose another material, or state refractive_index in [material."tantala-ibs"]
2 problems"""),
    "not-a-number": (change("quarter_waves = 1.0", "quarter_waves = nan"), """\
{f}:10:56: quarter_waves in layer 1 of [[coating.block]] 1 is nan
    10 | layers = [ { material = "tantala-ibs", quarter_waves = nan } ]
       |                                                        ^^^
       it must be from 1e-9 to 1e9"""),
    "infinite": (change("quarter_waves = 1.0", "quarter_waves = inf"), """\
{f}:10:56: quarter_waves in layer 1 of [[coating.block]] 1 is inf
    10 | layers = [ { material = "tantala-ibs", quarter_waves = inf } ]
       |                                                        ^^^
       it must be from 1e-9 to 1e9"""),
    "beyond-double": (change("quarter_waves = 1.0", "quarter_waves = 1e400"), """\
{f}:10:56: quarter_waves in layer 1 of [[coating.block]] 1 is inf
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 1e400 } ]
       |                                                        ^^^^^
       it must be from 1e-9 to 1e9"""),
    "beyond-double-with-unit": (change('"1 mm"', '"1e400 mm"'), """\
{f}:4:10: radius in [beam]: the number in "1e400 mm" is beyond what can be held
     4 | radius = "1e400 mm"
       |          ^^^^^^^^^^
       write a length with its unit, for example "0.42 mm\""""),
    "no-block": (change("[[coating.block]]\n" + LAYER, "[coating]"), """\
{f}:9:1: the coating has no layers
     9 | [coating]
       | ^^^^^^^^^
       add [[coating.block]] with layers = [ ... ]"""),
    "empty-stack": (change(LAYER, "layers = []"), """\
{f}:10:10: [[coating.block]] 1 has no layers
    10 | layers = []
       |          ^^"""),
    "beam-radius-zero": (change('"1 mm"', '"0 mm"'), """\
{f}:4:10: radius in [beam] is "0 mm"
     4 | radius = "0 mm"
       |          ^^^^^^
       it must be from 1e-09 m to 1000 m"""),
    "right-angle": (change('"1064 nm"', '"1064 nm"\nangle = "90 deg"\npolarisation = "s"'), """\
{f}:3:9: angle in [light] is "90 deg"
     3 | angle = "90 deg"
       |         ^^^^^^^^
       it must be from 0 deg to less than 90 deg"""),
    "polarisation-missing": (change('"1064 nm"', '"1064 nm"\nangle = "10 deg"'), """\
{f}:1:1: polarisation is missing in [light]
     1 | [light]
       | ^^^^^^^
       add polarisation = "s", "p" or "unpolarised" (off normal incidence)"""),
    "unknown-polarisation": (change('"1064 nm"', '"1064 nm"\nangle = "10 deg"\npolarisation = "t"'), """\
{f}:4:16: polarisation in [light] is "t"
     4 | polarisation = "t"
       |                ^^^
       it must be one of "s", "p", "unpolarised\""""),
    "two-thicknesses": (change("quarter_waves = 1.0", 'quarter_waves = 1.0, thickness = "5 nm"'), """\
{f}:10:61: thickness and quarter_waves in layer 1 of [[coating.block]] 1 contradict each other
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 1.0, thickness = "5 nm" } ]
       |                                                             ^^^^^^^^^
       and here: {f}:10:40
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 1.0, thickness = "5 nm" } ]
       |                                        ^^^^^^^^^^^^^
       a layer has one thickness: keep one of the two"""),
    "property-unknown-and-strict": (change("tantala-ibs", "gold-film"), """\
thermal, all coherent not computed: dn/dT of gold-film unknown: no value recorded; give it in [material."gold-film"]
       refused because of --strict; nothing was written""", ["appraise", "design.toml", "--strict", "--out", "result.txt"]),
    "metal-without-absorption": (change("tantala-ibs", "gold-film").replace('"295 K"', '"124 K"') +
                                 '[material.gold-film]\nrefractive_index = { value = 0.2, source = "x" }\n', """\
{f}:10:25: extinction coefficient of gold-film at 124 K unknown (its data hold for 283–313 K)
    10 | layers = [ { material = "gold-film", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^^^^
       choose another material, or state extinction_coefficient in [material."gold-film"]"""),
    "override-not-a-table": (GOOD + "[material.tantala-ibs]\nloss_angle = 3e-4\n", """\
{f}:12:14: loss_angle in [material."tantala-ibs"] must be a table
    12 | loss_angle = 3e-4
       |              ^^^^
       for example loss_angle = { value = 3e-4, source = "..." }"""),
    "spot-twice": (GOOD + '[band]\nspot = ["1 Hz", "1 Hz"]\n', """\
{f}:12:8: spot in [band] must hold at least one frequency, each once
    12 | spot = ["1 Hz", "1 Hz"]
       |        ^^^^^^^^^^^^^^^^
       leave it out for the powers of ten in the band"""),
    "refers-to-itself": (GOOD + '[material.tantala-ibs]\ndensity = { same_as = "tantala-ibs", source = "x" }\n', """\
{f}:12:11: density of tantala-ibs refers to other materials in a circle
    12 | density = { same_as = "tantala-ibs", source = "x" }
       |           ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^"""),
    "refers-to-nothing": (GOOD + '[material.tantala-ibs]\ndensity = { same_as = "silica-ib", source = "x" }\n', """\
{f}:12:11: density of tantala-ibs refers to the unknown material "silica-ib"
    12 | density = { same_as = "silica-ib", source = "x" }
       |           ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^
       did you mean "silica-ibs"?"""),
    "unit-with-an-origin": (change('"295 K"', '"295 K from 3"'), """\
{f}:8:15: temperature in [environment]: "K from 3" is not a unit
     8 | temperature = "295 K from 3"
       |               ^^^^^^^^^^^^^^
       write a temperature with its unit, for example "295 K\""""),
    "unit-without-end": (change('"1 mm"', '"1 m' + "(" * 10_000 + '"'), """\
{f}:4:10: radius in [beam]: a text this long is not a unit
     4 | radius = "1 m""" + "(" * 87 + """
       |          """ + "^" * 91 + """
       write a length with its unit, for example "0.42 mm\""""),
    "two-losses": (GOOD + '[material.tantala-ibs]\nloss_angle = { value = 1e-4, source = "x" }\n'
                   'loss_angle_bulk = { value = 1e-4, source = "x" }\n', """\
{f}:13:1: loss_angle_bulk and loss_angle in [material."tantala-ibs"] contradict each other
    13 | loss_angle_bulk = { value = 1e-4, source = "x" }
       | ^^^^^^^^^^^^^^^
       and here: {f}:12:1
    12 | loss_angle = { value = 1e-4, source = "x" }
       | ^^^^^^^^^^
       give loss_angle for both, or loss_angle_bulk with loss_angle_shear"""),
    "lone-diameter": (change('"fused-silica"', '"fused-silica"\ndiameter = "1 cm"'), """\
{f}:7:12: diameter in [mirror] stands alone
     7 | diameter = "1 cm"
       |            ^^^^^^
       give diameter and thickness for a finite mirror, neither for a half-space"""),
    "rear-face-without-thickness": (GOOD + "[rear_face]\n", """\
{f}:11:1: [rear_face] stands behind a half-space
    11 | [rear_face]
       | ^^^^^^^^^^^
       give diameter and thickness in [mirror]"""),
    "roughness-without-band": (change('"fused-silica"', '"fused-silica"\nroughness = { rms = "0.1 nm" }'), """\
{f}:7:13: band is missing in roughness of [mirror]
     7 | roughness = { rms = "0.1 nm" }
       |             ^^^^^^^^^^^^^^^^^^
       add band = ["1 1/mm", "1000 1/mm"], the spatial frequencies of the rms"""),
    "roughness-and-scatter": (change('"fused-silica"', '"fused-silica"\n'
                                     'roughness = { rms = "0.1 nm", band = ["1 1/mm", "1000 1/mm"] }\n'
                                     'scatter = { value = "3 ppm", source = "x" }'), """\
{f}:8:1: scatter and roughness in [mirror] contradict each other
     8 | scatter = { value = "3 ppm", source = "x" }
       | ^^^^^^^
       and here: {f}:7:1
     7 | roughness = { rms = "0.1 nm", band = ["1 1/mm", "1000 1/mm"] }
       | ^^^^^^^^^
       scatter is stated, or it follows from the roughness: keep one"""),
    "unknown-passes": (change('"fused-silica"', '"fused-silica"\ndiameter = "1 cm"\nthickness = "5 mm"')
                       + '[rear_face]\npasses = "fields"\n', """\
{f}:14:10: passes in [rear_face] is "fields"
    14 | passes = "fields"
       |          ^^^^^^^^
       it must be one of "intensities", "amplitudes\""""),
    "light-from-the-left": (change('"1064 nm"', '"1064 nm"\nfrom = "left"'), """\
{f}:3:8: from in [light] is "left"
     3 | from = "left"
       |        ^^^^^^
       it must be one of "front", "rear\""""),
    "light-from-a-missing-rear": (change('"1064 nm"', '"1064 nm"\nfrom = "rear"'), """\
{f}:3:8: light from the rear needs [rear_face]
     3 | from = "rear"
       |        ^^^^^^
       add [rear_face]; an empty table is a bare rear face"""),
    "not-toml": ("this is no TOML\n", """\
{f}:1:1: not valid TOML: missing key-value separator `=`
     1 | this is no TOML
       | ^
       the format is TOML 1.0, https://toml.io"""),
    "key-twice": (change('radius = "1 mm"', 'radius = "1 mm"\nradius = "2 mm"'), """\
{f}:5:10: not valid TOML: value ("radius") already exists.
     5 | radius = "2 mm"
       |          ^
       the format is TOML 1.0, https://toml.io"""),
    "unknown-alternative": (GOOD + '[material.tantala-ibs]\nloss_angle = { alternative = "none" }\n', """\
{f}:12:30: loss_angle of tantala-ibs has no alternative "none"
    12 | loss_angle = { alternative = "none" }
       |                              ^^^^^^
       known: thermal-noise, between-laboratories, cavity-stack"""),
    "absorbing-incident-medium": (change('"1064 nm"', '"1064 nm"\nmedium = "gold-film"'), """\
{f}:3:10: gold-film absorbs (k = 7.11): an absorbing incident medium is refused
     3 | medium = "gold-film"
       |          ^^^^^^^^^^^
       reflectance and transmittance are not defined in it"""),
    "all-problems-at-once": (change('"1 mm"', '"1 K"').replace('"295 K"', "295").replace("tantala-ibs", "tantal"), """\
{f}:4:10: radius in [beam]: "K" is not a unit of length
     4 | radius = "1 K"
       |          ^^^^^
       write a length with its unit, for example "0.42 mm"
{f}:8:15: temperature in [environment] needs a temperature with a unit, here it is a bare number
     8 | temperature = 295
       |               ^^^
       for example temperature = "295 K"
{f}:10:25: unknown material "tantal"
    10 | layers = [ { material = "tantal", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^
       did you mean "tantala-ibs"? `stillcoat materials` lists all
3 problems"""),
    "too-many-layers": (change("layers =", "repeat = 20000\nlayers =").replace(
        "1.0 } ]", '1.0 }, { material = "silica-ibs", quarter_waves = 1 } ]'), """\
{f}:10:10: the stack has more than 20000 layers
    10 | repeat = 20000
       |          ^^^^^
       larger stacks are refused"""),
    "too-large": (GOOD + "#" * 8_000_000, """\
{f}: 8000207 bytes; files above 8000000 bytes are refused
       use `repeat` for periodic stacks"""),
    "empty-file": ("", """\
{f}: [light] is missing
       add [light] with wavelength = "1064 nm"
{f}: [beam] is missing
       add [beam] with radius = "0.42 mm" (1/e² intensity radius)
{f}: [mirror] is missing
       add [mirror] with substrate = "fused-silica"
{f}: [environment] is missing
       add [environment] with temperature = "295 K"
{f}: [coating] is missing
       add [coating] and at least one [[coating.block]]
5 problems"""),
    "directory": (pathlib.Path, "{f}: is a directory\n       give a file"),
    "no-such-file": (None, "{f}: no such file\n       check the name and folder"),
    "existing-result": (GOOD, "design.toml: exists already and was kept\n       give --replace to overwrite it",
                        ["appraise", "design.toml", "--out", "design.toml"]),
    "result-in-no-folder": (GOOD, "none/result.txt: cannot create: No such file or directory\n"
                            "       nothing was written", ["appraise", "design.toml", "--out", "none/result.txt"]),
    "frequency-in-turns": (GOOD + '[band]\nto = "6000 rpm"\n', """\
{f}:12:6: to in [band]: "rpm" is not a unit of frequency
    12 | to = "6000 rpm"
       |      ^^^^^^^^^^
       write a frequency with its unit, for example "100 Hz\""""),
    "quarter-waves-in-turns": (change("quarter_waves = 1.0", 'quarter_waves = "1 turn"'), """\
{f}:10:56: quarter_waves in layer 1 of [[coating.block]] 1: "turn" is not a unit of pure number
    10 | layers = [ { material = "tantala-ibs", quarter_waves = "1 turn" } ]
       |                                                        ^^^^^^^^
       write a pure number with its unit, for example "0.5\""""),
    "extinction-and-absorption": (GOOD + """[material.silica-ibs]
extinction_coefficient = { value = 1e-7, source = "x" }
absorption_coefficient = { value = "1e-3 1/m", source = "x" }
""", """\
{f}:12:1: extinction_coefficient and absorption_coefficient in [material."silica-ibs"] contradict each other
    12 | extinction_coefficient = { value = 1e-7, source = "x" }
       | ^^^^^^^^^^^^^^^^^^^^^^
       and here: {f}:13:1
    13 | absorption_coefficient = { value = "1e-3 1/m", source = "x" }
       | ^^^^^^^^^^^^^^^^^^^^^^
       each follows from the other: keep one of the two"""),
    "table-shorter-than-its-range": (GOOD + """[material.tantala-ibs]
loss_angle = { temperature_K = [280, 300], values = [3e-4, 4e-4], range = { temperature_K = [4, 300] }, source = "x" }
""", """\
{f}:12:93: temperature_K in range of loss_angle of tantala-ibs is [4, 300], its table ends at 280 and 300
    12 |  values = [3e-4, 4e-4], range = { temperature_K = [4, 300] }, source = "x" }
       |                                                   ^^^^^^^^
       a little above the end: continued_to_K; further: a rule under beyond"""),
    "wavelength-beyond-own-table": (GOOD + """[material.tantala-ibs]
refractive_index = { wavelength_nm = [400, 600], values = [2.2, 2.1], medium = "vacuum", source = "x" }
""", """\
{f}:10:25: refractive index of tantala-ibs is known for 400–600 nm only, not at 1064 nm
    10 | layers = [ { material = "tantala-ibs", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^^^^^^
       choose another material, or state refractive_index in [material."tantala-ibs"]"""),
    "loss-above-one-in-the-band": (GOOD + """[material.tantala-ibs]
loss_angle = { value_at_1_Hz = 1e-4, exponent = 2, source = "x" }
""", """\
coating Brownian not computed: loss angle of tantala-ibs at 295 K and 100 Hz comes out as 1; it must be from 0 to less than 1; give it in [material."tantala-ibs"]
       refused because of --strict; nothing was written""", ["appraise", "design.toml", "--strict", "--out", "result.txt"]),
    "brackets-behind-a-long-text": ('a = """\n" """\nb = ' + "[" * 10000, """\
{f}:3:1: nested deeper than 64 levels
       write the tables flat"""),
    "layers-times-frequencies": (change("layers =", "repeat = 20000\nlayers =") + "[band]\npoints_per_decade = 1000\n", """\
{f}: 20000 layers at 4004 frequencies: the product is above 2000000
       take fewer points per decade, or a narrower [band]"""),
    "inner-block-without-layers": (change(LAYER, "layers = [ { repeat = 3 } ]"), """\
{f}:10:12: layers is missing in the block layer 1 of [[coating.block]] 1
    10 | layers = [ { repeat = 3 } ]
       |            ^^^^^^^^^^^^^^
       add layers = [ { material = "silica-ibs", quarter_waves = 1.0 } ]"""),
    "table-and-blocks": (change("[[coating.block]]", '[coating]\ntable = "x.csv"\n[[coating.block]]'), """\
{f}:10:1: table and block in [coating] contradict each other
    10 | table = "x.csv"
       | ^^^^^
       and here: {f}:11:1
    11 | [[coating.block]]
       | ^^^^^^^^^^^^^^^^^
       a coating has one list of layers: keep one of the two"""),
    "table-missing": (change("[[coating.block]]\n" + LAYER, '[coating]\ntable = "x.csv"'), """\
{f}:10:9: x.csv: no such file
    10 | table = "x.csv"
       |         ^^^^^^^
       check the name and folder"""),
    "times-and-value": (GOOD + """[material.tantala-ibs]
loss_angle = { times = 2, value = 1e-4, source = "x" }
""", """\
{f}:12:16: times and value in loss_angle of tantala-ibs contradict each other
    12 | loss_angle = { times = 2, value = 1e-4, source = "x" }
       |                ^^^^^
       and here: {f}:12:27
    12 | loss_angle = { times = 2, value = 1e-4, source = "x" }
       |                           ^^^^^
       times multiplies the library's own value, range and width: only source, and a note, go with it"""),
    "times-too-much": (GOOD + """[material.tantala-ibs]
loss_angle = { times = 2000, source = "x" }
""", """\
{f}:12:24: times in loss_angle of tantala-ibs is 2000
    12 | loss_angle = { times = 2000, source = "x" }
       |                        ^^^^
       it must be from 0.001 to 1000"""),
    "times-nothing": (GOOD + """[material.tantala-ibs]
absorption_coefficient = { times = 2, source = "x" }
""", """\
{f}:12:36: absorption_coefficient of tantala-ibs is unknown: there is nothing to multiply
    12 | absorption_coefficient = { times = 2, source = "x" }
       |                                    ^
       it has extinction_coefficient: multiply that"""),
    "layer-of-a-kept-value": (change("tantala-ibs", "silica-ibs (library)") + """[material.silica-ibs]
density = { times = 2, source = "x" }
""", """\
{f}:10:25: unknown material "silica-ibs (library)"
    10 | layers = [ { material = "silica-ibs (library)", quarter_waves = 1.0 } ]
       |                         ^^^^^^^^^^^^^^^^^^^^^^
       `stillcoat materials` lists the known ones"""),
    "mixture-of-one": ('name = "design"\ntitle = "x"\nform = "film"\n[mixture]\nof = ["silica-ibs"]\n'
                       'volume_fraction = 2\n', """\
{f}:4:1: source is missing in [mixture]
     4 | [mixture]
       | ^^^^^^^^^
       add source = ["key of references.toml"]
{f}:5:6: of in [mixture] must name two materials
     5 | of = ["silica-ibs"]
       |      ^^^^^^^^^^^^^^
       for more, mix a mixture
{f}:6:19: volume_fraction in [mixture] is 2
     6 | volume_fraction = 2
       |                   ^
       it must be from 0 to 1, that of the second material
3 problems""", ["materials", "--check", "design.toml"]),
    "template-of-a-material": (GOOD, """\
name excludes --template
Run with --help for more information.""", ["materials", "silicon", "--template"]),
    "table-semicolons": ({"design.toml": TABLE, "t.csv": "material;thickness_nm\nsilica-ibs;100,5\n"}, """\
t.csv:1:1: the columns are not separated by commas
     1 | material;thickness_nm
       | ^^^^^^^^^^^^^^^^^^^^^
       save the table with commas between the cells and points in the numbers"""),
    "table-unknown-material": ({"design.toml": TABLE, "t.csv": "material,thickness_nm\nsilica,100\n"}, """\
t.csv:2:1: unknown material "silica"
     2 | silica,100
       | ^^^^^^
       did you mean "silica-ibs"? `stillcoat materials` lists all"""),
    "table-short-row": ({"design.toml": TABLE, "t.csv": "number,material,thickness_nm\n1,silica-ibs\n"}, """\
t.csv:2:1: 2 cells where the header has 3
     2 | 1,silica-ibs
       | ^
       quote a cell that holds a comma"""),
    "table-negative": ({"design.toml": TABLE, "t.csv": "material,thickness_nm\nsilica-ibs,-3\n"}, """\
t.csv:2:12: thickness_nm is -3
     2 | silica-ibs,-3
       |            ^^
       it must be from 1e-6 nm to 1e9 nm"""),
    "table-no-number": ({"design.toml": TABLE, "t.csv": 'material,thickness_nm\nsilica-ibs,"100.5 nm"\n'}, """\
t.csv:2:12: "100.5 nm" is not a number for thickness_nm
     2 | silica-ibs,"100.5 nm"
       |            ^^^^^^^^
       a decimal number such as 241.3 is expected"""),
    "table-text-behind-quote": ({"design.toml": TABLE, "t.csv": 'material,thickness_nm\n"silica-ibs"x,100\n'}, """\
t.csv:2:1: text behind the closing quote
     2 | "silica-ibs"x,100
       | ^
       double a quote that belongs to the cell"""),
    "table-unknown-column": ({"design.toml": TABLE, "t.csv": "material,thicknes_nm\nsilica-ibs,100\n"}, """\
t.csv:1:1: there is no column "thickness_nm"
     1 | material,thicknes_nm
       | ^^^^^^^^
       needed: material, thickness_nm
t.csv:1:10: unknown column "thicknes_nm"
     1 | material,thicknes_nm
       |          ^^^^^^^^^^^
       did you mean thickness_nm?
2 problems"""),
    "table-row-lost": ({"design.toml": TABLE, "t.csv": "number,material,thickness_nm\n1,silica-ibs,100\n3,silica-ibs,100\n"}, """\
t.csv:3:1: layer 2 is numbered "3"
     3 | 3,silica-ibs,100
       | ^
       layers count from 1, the outermost; leave the column out if it does not matter"""),
    "curve-column-unread": ({"design.toml": GOOD + """[material.tantala-ibs]
refractive_index = { wavelength_csv = "n.csv", medium = "vacuum", source = "x" }
""", "n.csv": "wavelength_nm,refractive_index,extinction_coefficient\n900,2.1,1e-5\n1200,2.0,1e-5\n"}, """\
{f}:12:20: the column extinction_coefficient of n.csv would not be read
    12 | refractive_index = { wavelength_csv = "n.csv", medium = "vacuum", source = "x" }
       |                    ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^
       add extinction_coefficient = { wavelength_csv = "n.csv", ... }, or take the column out"""),
    "sweep-unknown-quantity": (GOOD, """\
--over: unknown quantity "wavelenght"
       did you mean wavelength? known: wavelength, angle, temperature, beam_radius, frequency, layer.N, MATERIAL.thickness, MATERIAL.PROPERTY""", ["sweep", "design.toml", "--over", "wavelenght=1um:2um:3"]),
    "sweep-one-end": (GOOD, """\
--over: "wavelength=1um:3" is no NAME=FROM:TO:COUNT
       for example wavelength=900nm:1300nm:401, or frequency=1Hz:10kHz:81:log""", ["sweep", "design.toml", "--over", "wavelength=1um:3"]),
    "sweep-other-material": (GOOD, """\
--over: the mirror holds no hafnia-ibs
       it holds fused-silica, tantala-ibs""", ["sweep", "design.toml", "--over", "hafnia-ibs.loss_angle=1e-4:2e-4:3"]),
    "sweep-factor-as-length": (GOOD, """\
--over tantala-ibs.thickness: "nm" is not a unit of pure number
       it is a factor on the thickness, such as 0.98; for a thickness in nm vary layer.N""", ["sweep", "design.toml", "--over", "tantala-ibs.thickness=100nm:200nm:3"]),
    "sweep-right-angle": (GOOD, """\
--over angle: the design states no polarisation
       add polarisation = "s", "p" or "unpolarised" to [light]""", ["sweep", "design.toml", "--over", "angle=80deg:95deg:3"]),
    "sweep-unknown-result": (GOOD, """\
--show: unknown result "transmitance"
       did you mean transmittance?""", ["sweep", "design.toml", "--over", "wavelength=1um:2um:3", "--show", "transmitance"]),
    "sweep-resume-nothing": (GOOD, """\
--resume needs a design file and --out FILE
       an interrupted sweep is kept beside its file""", ["sweep", "design.toml", "--over", "wavelength=1um:2um:3", "--resume"]),
    "sweep-map-of-three": (GOOD, """\
a map shows one result, here are 2
       choose one with --show, for example --show transmittance""", ["sweep", "design.toml", "--over", "wavelength=1um:2um:3", "--over", "beam_radius=1mm:2mm:3",
                                        "--show", "loss,transmittance", "--figure", "m.svg"]),
    "sweep-into-no-folder": (GOOD, """\
none/x.csv: cannot create: No such file or directory
       nothing was written""", ["sweep", "design.toml", "--over", "wavelength=1um:2um:3", "--out", "none/x.csv"]),
    "figure-ending": (GOOD, """\
noise.jpg: a figure goes into a file whose name ends in .svg, .pdf or .png
       for example noise.svg""", ["appraise", "design.toml", "--figure", "noise.jpg"]),
    "figure-over-input": ({"design.toml": TABLE, "x.svg.csv": "material,thickness_nm\nsilica-ibs,100\n",
                           "t.csv": "material,thickness_nm\nsilica-ibs,100\n"}, """\
x.svg.csv: the figure would overwrite x.svg.csv
       give the figure another name""",
                          ["sweep", "design.toml", "--over", "wavelength=1um:2um:3", "--out", "x.svg.csv", "--replace", "--figure", "x.svg"]),
    "draft-without-target": (None, """\
missing: --transmittance (or --antireflecting)
       without any option the smallest example is written""", ["draft", "--high", "tantala-ibs", "--low", "silica-ibs", "--substrate", "fused-silica",
                                          "--wavelength", "1064 nm"]),
    "draft-indices-exchanged": (None, """\
the high index (silica-ibs: 1.4530) is not above the low one (tantala-ibs: 2.0500)
       exchange --high and --low, or choose other materials""", ["draft", "--high", "silica-ibs", "--low", "tantala-ibs", "--substrate", "fused-silica",
                                             "--wavelength", "1064 nm", "--transmittance", "5 ppm"]),
    "draft-needs-alternative": (None, """\
refractive index of silicon is known for 1100–5600 nm only, not at 1064 nm
       its alternative reaches there: [material."silicon"] refractive_index = { alternative = "visible" }; here: --alternative MATERIAL.PROPERTY=NAME""", ["draft", "--high", "tantala-ibs", "--low", "silica-ibs", "--substrate", "silicon",
                                             "--wavelength", "1064 nm", "--transmittance", "5 ppm"]),
    "layers-no-file": (None, """\
none.toml: no such file
       check the name and folder""", ["layers", "none.toml"]),
    "full-disk": (GOOD, "/dev/full: cannot write: No space left on device\n       what it holds now is not complete",
                  ["appraise", "design.toml", "--replace", "--out", "/dev/full"]),
    "unknown-command": (GOOD, """\
unknown command "apraise"
       did you mean appraise?""", ["apraise", "design.toml"]),
    "no-file-named": (GOOD, """\
design is required
Run with --help for more information.""", ["appraise"]),
    "unknown-option": (GOOD, """\
The following argument was not expected: --colour
Run with --help for more information.""", ["appraise", "design.toml", "--colour"]),
    "unknown-csv-table": (GOOD, """\
--csv: layer not in {noise,layers,field}
Run with --help for more information.""", ["appraise", "design.toml", "--csv", "layer"]),
    "csv-and-json": (GOOD, """\
--json excludes --csv
Run with --help for more information.""", ["appraise", "design.toml", "--csv", "layers", "--json"]),
    "materials-unknown-name": (GOOD, """\
unknown material "tantalla-ibs"
       did you mean "tantala-ibs"?""", ["materials", "tantalla-ibs"]),
    "materials-unknown-property": (GOOD, """\
unknown property "los_angle"
       did you mean loss_angle?""", ["materials", "tantala-ibs", "los_angle"]),
    "materials-bad-temperature": (GOOD, """\
--temperature: "295" has no unit
       write a temperature with its unit, for example "295 K\"""", ["materials", "tantala-ibs", "density", "--temperature", "295"]),
    "materials-outside-range": (GOOD, """\
density of gold-film at 4 K unknown (its data hold for 283–313 K)""", ["materials", "gold-film", "density", "--temperature", "4 K"]),
    "materials-no-folder": (GOOD, """\
none: no such folder of materials
       it must hold one TOML file per material""", ["appraise", "design.toml", "--materials", "none"]),
    "material-file-not-strict": ('name = "x"\ntitle = "x"\nform = "film"\n[density]\nvalue = 2200\n', """\
{f}:1:8: name "x" differs from the file name design
     1 | name = "x"
       |        ^^^
       rename one of the two
{f}:4:1: unit is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add unit = "kg/m3"
{f}:4:1: uncertainty is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add uncertainty = "not stated"
{f}:4:1: source is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add source = ["key of references.toml"]
{f}:4:1: place is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add place = "..."
{f}:4:1: measured_at is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add measured_at = "..."
{f}:4:1: range is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add range = { temperature_K = [283, 313] }
{f}:4:1: nature is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add nature = "measured"
{f}:4:1: status is missing in [density]
     4 | [density]
       | ^^^^^^^^^
       add status = "seen"
9 problems""",
                                 ["materials", "--check", "design.toml"]),
    "unreadable": ("/proc/self/mem", "/proc/self/mem: cannot be read\n       check its permissions"),
}


def run(program, name):
    content, expected, *rest = CASES[name]
    with tempfile.TemporaryDirectory() as folder:
        file = pathlib.Path(folder) / "design.toml"
        target = "design.toml"
        if content is pathlib.Path:
            file.mkdir()
        elif content == "/proc/self/mem":
            target = content
        elif isinstance(content, dict):
            for path, text in content.items():
                (pathlib.Path(folder) / path).write_text(text)
        elif content is not None:
            file.write_text(content)
        before = sorted(os.listdir(folder))
        arguments = rest[0] if rest else ["appraise", target, "--out", "result.txt"]
        result = subprocess.run([program, *arguments], cwd=folder, capture_output=True, text=True, timeout=60)
        problems = []
        if result.returncode != 2:
            problems.append(f"exit code {result.returncode} instead of 2")
        if result.stdout:
            problems.append(f"standard output: {result.stdout[:500]}")
        if sorted(os.listdir(folder)) != before:
            problems.append(f"left behind: {sorted(os.listdir(folder))}")
        if expected is None:
            problems.append("no expected message")
        elif result.stderr.rstrip("\n") != expected.replace("{f}", "design.toml"):
            problems.append("another message than expected:")
        for problem in problems:
            print(problem)
        if problems:
            print(result.stderr)
        else:
            print("exact message, exit code 2, nothing written")
        return 1 if problems else 0


if __name__ == "__main__":
    if sys.argv[1] == "--list":
        print(";".join(CASES), end="")
        sys.exit(0)
    sys.exit(run(sys.argv[1], sys.argv[2]))
