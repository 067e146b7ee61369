"""Command lines that must work, and what they must say."""
import csv
import io
import json
import pathlib
import signal
import subprocess
import sys
import tempfile
import time
import xml.etree.ElementTree

program, root = sys.argv[1], pathlib.Path(sys.argv[2])
design = root / "examples/end-mirror/design.toml"
faults = []


def run(*arguments, stdin=None, code=0, cwd=None):
    result = subprocess.run([program, *map(str, arguments)], capture_output=True, text=True, input=stdin, cwd=cwd)
    if result.returncode != code:
        faults.append(f"{arguments}: exit code {result.returncode}, {result.stderr}")
    return result


def expect(condition, what):
    if not condition:
        faults.append(what)


text = run("appraise", design).stdout
expect("\x1b" not in text, "colour outside a terminal")
expect(run("appraise", "-", stdin=design.read_text()).stdout.splitlines()[2:] == text.splitlines()[2:],
       "standard input gives another page than the file")

# The JSON document and the CSV tables hold the same numbers.
document = json.loads(run("appraise", design, "--json").stdout)
noise = document["faces"][0]["noise"]
table = list(csv.DictReader(io.StringIO(run("appraise", design, "--csv", "noise").stdout)))
expect([float(r["frequency_Hz"]) for r in table] == noise["frequencies_Hz"], "CSV and JSON frequencies differ")
expect([float(r["total_psd_m2_per_Hz"]) for r in table] == noise["total_psd_m2_per_Hz"],
       "CSV and JSON totals differ")
total = [sum(t["psd_m2_per_Hz"][i] for t in noise["terms"] if t["in_total"]) for i in range(len(table))]
expect(all(abs(a / b - 1) < 1e-12 for a, b in zip(total, noise["total_psd_m2_per_Hz"])),
       "the total is not the sum of its terms")
layers = list(csv.DictReader(io.StringIO(run("appraise", design, "--csv", "layers").stdout)))
expect(len(layers) == document["coating"]["layer_count"] == 36, "layers table")
field = list(csv.DictReader(io.StringIO(run("appraise", design, "--csv", "field").stdout)))
expect(len(field) > 36 and all(float(r["intensity_ratio"]) >= 0 for r in field), "field table")
face = document["faces"][0]
expect(abs(face["transmittance"] + face["absorptance"] - face["loss"]) < 1e-18, "loss is not T + A")
expect(abs(face["reflectance"] + face["loss"] - 1) < 1e-12, "R + T + A is not 1")
expect(run("appraise", design, "--json").stdout == run("appraise", design, "--json").stdout, "two runs differ")

with tempfile.TemporaryDirectory() as folder:
    folder = pathlib.Path(folder)
    run("appraise", design, "--out", folder / "a.txt")
    expect((folder / "a.txt").read_text() == text, "--out writes another page")
    run("appraise", design, "--out", folder / "a.txt", code=2)
    run("appraise", design, "--out", folder / "a.txt", "--replace")
    expect([p.name for p in folder.iterdir()] == ["a.txt"], "files left behind")

    # A user's folder replaces a material; a user's file can be checked.
    user = folder / "mine"
    user.mkdir()
    (user / "references.toml").write_text('[bench]\ncitation = "bench note (invented)"\nseen = "text"\n')
    film = (root / "materials/tantala-ibs.toml").read_text().replace('name = "tantala-ibs"', 'name = "my-film"', 1)
    film = film.replace('source = ["LiBellon2014"]', 'source = ["bench"]')
    (user / "my-film.toml").write_text(film)
    expect("my-film" in run("materials", "--materials", user).stdout, "the user's material is not listed")
    expect("no problems" in run("materials", "--check", user / "my-film.toml").stdout, "the user's file is not accepted")
    mine = folder / "mine.toml"
    mine.write_text(design.read_text().replace("titania-tantala-ibs", "my-film"))
    expect("bench note" in run("appraise", mine, "--materials", user).stdout, "the user's source is not named")

# Values in the design file take over, with their source.
override = design.read_text() + '[material."silica-ibs"]\nyoungs_modulus = { value = "80 GPa", source = "own bench (invented)" }\n'
changed = run("appraise", "-", stdin=override).stdout
expect("own bench (invented)" in changed and "no uncertainty is stated for: Young's modulus of silica-ibs" in changed,
       "override not shown")
expect(changed != text, "the override changes nothing")

# Where nothing is reflected there is no phase: said in words and as null, never as a number.
nothing = """[light]
wavelength = "1064 nm"
medium = "fused-silica"
[beam]
radius = "1 mm"
[mirror]
substrate = "fused-silica"
[environment]
temperature = "295 K"
[[coating.block]]
layers = [ { material = "fused-silica", thickness = "100 nm" } ]
[material.fused-silica]
extinction_coefficient = { value = 0, source = "x" }
"""
text_of_nothing = run("appraise", "-", stdin=nothing).stdout
expect("not defined" in text_of_nothing and "nan" not in text_of_nothing, "phase of no light, text")
face_of_nothing = json.loads(run("appraise", "-", "--json", stdin=nothing).stdout)["faces"][0]
expect(face_of_nothing["reflection_phase_rad"] is None, "phase of no light, JSON")
expect(face_of_nothing["noise"]["terms"][0]["psd_m2_per_Hz"] is None, "noise of no light")

# Help goes where it is asked to go, and a full disk is no success.
for words in (["--help"], ["--version"], []):
    with open("/dev/full", "w") as full:
        result = subprocess.run([program, *words], stdout=full, stderr=subprocess.PIPE, text=True)
    expect(result.returncode == 2 and "No space left" in result.stderr, f"{words} to a full disk")

# Layers to the coater and back: the same appraisal to the last byte.
with tempfile.TemporaryDirectory() as folder:
    folder = pathlib.Path(folder)
    for place in ("a", "b"):
        (folder / place).mkdir()
    source = design.read_text()
    (folder / "a/design.toml").write_text(source)
    run("layers", "design.toml", "--csv", "--out", folder / "b/run17.csv", cwd=folder / "a")
    head = source[:source.index("[[coating.block]]")]
    expect("[coating]" in head, "the example has no [coating] before its blocks")
    (folder / "b/design.toml").write_text(head + '\ntable = "run17.csv"\n')
    for words in ([], ["--json"], ["--csv", "layers"]):
        pages = [run("appraise", "design.toml", *words, cwd=folder / place).stdout for place in ("a", "b")]
        expect(pages[0] == pages[1] and pages[0], f"round trip through the layer table, {words}")
    expect(run("layers", "design.toml", "--csv", cwd=folder / "a").stdout == (folder / "b/run17.csv").read_text(),
           "the layer table of the design read back")
expect("Totals by material" in run("layers", design).stdout, "layers page")

# A draft is a design without a warning; its comment holds the neighbouring counts.
for cap in ("none", "quarter-wave", "half-wave"):
    for target in ("5 ppm", "20 %"):
        drafted = run("draft", "--high", "tantala-ibs", "--low", "silica-ibs", "--substrate", "fused-silica",
                      "--wavelength", "1064 nm", "--transmittance", target, "--cap", cap)
        document = json.loads(run("appraise", "-", "--json", stdin=drafted.stdout).stdout)
        limit = 5e-6 if target == "5 ppm" else 0.2
        expect(document["warnings"] == [], f"draft {cap} {target}: {document['warnings']}")
        expect(document["transmittance"] <= limit, f"draft {cap} {target}: misses its transmittance")
        counts = [line for line in drafted.stderr.splitlines() if "pairs transmit" in line]
        expect(len(counts) in (2, 3) and "<- drafted" in counts[-2], f"draft {cap} {target}: {drafted.stderr}")
for temperature in ("295 K", "124 K"):
    two = run("draft", "--high", "tantala-ibs", "--low", "silica-ibs", "--substrate", "silicon",
              "--wavelength", "1397 nm", "--antireflecting", "--temperature", temperature)
    expect(json.loads(run("appraise", "-", "--json", stdin=two.stdout).stdout)["reflectance"] < 1e-9, "two layers reflect")
never = run("draft", "--high", "amorphous-silicon", "--low", "silica-ibs", "--substrate", "silicon",
            "--wavelength", "1550 nm", "--antireflecting", code=3)
expect("would have to be at most" in never.stderr, f"impossible pair: {never.stderr}")
smallest = run("draft").stdout
expect("[coating]" in smallest and run("appraise", "-", stdin=smallest).stdout, "the smallest example")

# A sweep that is interrupted keeps what it did and goes on from there to the same bytes.
with tempfile.TemporaryDirectory() as folder:
    folder = pathlib.Path(folder)
    words = ["sweep", design, "--over", "frequency=1Hz:10kHz:2000:log"]
    whole = run(*words, "--out", folder / "whole.csv")
    started = subprocess.Popen([program, *map(str, words), "--out", str(folder / "cut.csv")], stderr=subprocess.PIPE, text=True)
    # Wait until the program listens to Ctrl-C (bit 1 of the signals it catches), then for some points.
    while started.poll() is None:
        caught = next(l for l in open(f"/proc/{started.pid}/status") if l.startswith("SigCgt"))
        if int(caught.split()[1], 16) & 2:
            break
        time.sleep(0.01)
    time.sleep(0.4)
    started.send_signal(signal.SIGINT)
    stopped = started.communicate(timeout=60)[1]
    expect(started.returncode == 3 and "with --resume goes on" in stopped, f"interrupted sweep: {started.returncode}, {stopped}")
    expect(sorted(p.name for p in folder.iterdir()) == ["cut.csv.unfinished", "whole.csv"], "files of an interrupted sweep")
    expect("earlier sweep stopped here" in run(*words, "--out", folder / "cut.csv", code=2).stderr, "forgotten --resume")
    other = ["sweep", design, "--over", "frequency=1Hz:10kHz:30:log", "--out", folder / "cut.csv", "--resume"]
    expect("belongs to another sweep" in run(*other, code=2).stderr, "--resume of another sweep")
    changed = folder / "changed.toml"
    changed.write_text(design.read_text().replace('[environment]\ntemperature = "295 K"', '[environment]\ntemperature = "296 K"'))
    expect(changed.read_text() != design.read_text(), "the design was not changed")
    late = run("sweep", changed, *words[2:], "--out", folder / "cut.csv", "--resume", code=2)
    expect("has changed" in late.stderr, "--resume of a changed design")
    run(*words, "--out", folder / "cut.csv", "--resume")
    expect((folder / "cut.csv").read_bytes() == (folder / "whole.csv").read_bytes(), "resumed sweep differs")
    expect(not (folder / "cut.csv.unfinished").exists(), "unfinished file left behind")

# Figures hold the curves they claim; without gnuplot nothing else fails.
with tempfile.TemporaryDirectory() as folder:
    folder = pathlib.Path(folder)
    run("appraise", design, "--figure", folder / "noise.svg")
    svg = (folder / "noise.svg").read_text()
    titles = [e.text for e in xml.etree.ElementTree.fromstring(svg).iter("{http://www.w3.org/2000/svg}title")]
    for name in ("coating Brownian", "thermal, all coherent", "substrate Brownian", "sum"):
        expect(name in titles, f"noise figure has no curve {name}: {titles}")
    shown = list(csv.DictReader(open(folder / "noise.svg.csv")))
    total_column = next(name for name in shown[0] if name.startswith("sum"))
    expect(len(shown) == len(table) and all(abs(float(a[total_column]) ** 2 / float(b["total_psd_m2_per_Hz"]) - 1) < 1e-14
                                            for a, b in zip(shown, table)), "data beside the noise figure")
    run("appraise", design, "--figure", folder / "field.svg", "--draw", "field")
    titles = [e.text for e in xml.etree.ElementTree.fromstring((folder / "field.svg").read_text()).iter("{http://www.w3.org/2000/svg}title")]
    expect({"|E|²", "refractive index"} <= set(titles), f"field: {titles}")
    run("appraise", design, "--figure", folder / "field.pdf", "--draw", "field")
    expect((folder / "field.pdf").read_bytes().startswith(b"%PDF"), "field figure")
    run("sweep", design, "--over", "wavelength=1000nm:1600nm:61", "--figure", folder / "spectrum.svg")
    titles = [e.text for e in xml.etree.ElementTree.fromstring((folder / "spectrum.svg").read_text()).iter("{http://www.w3.org/2000/svg}title")]
    expect({"reflectance", "transmittance", "absorptance"} <= set(titles), f"spectrum: {titles}")
    run("sweep", design, "--over", "wavelength=1300nm:1500nm:9", "--over", "silica-ibs.thickness=0.98:1.02:5",
        "--show", "transmittance", "--figure", folder / "map.png")
    expect(len((folder / "map.png.csv").read_text().splitlines()) == 46, "map data")
    bare = subprocess.run([program, "appraise", str(design), "--figure", str(folder / "x.svg")], capture_output=True,
                          text=True, env={"PATH": str(folder)})
    expect(bare.returncode == 2 and "gnuplot" in bare.stderr and not (folder / "x.svg").exists(), f"no gnuplot: {bare.stderr}")

for arguments in (["--help"], *([command, "--help"] for command in ("draft", "appraise", "layers", "sweep", "materials", "units"))):
    out = run(*arguments).stdout
    expect("Usage" in out, f"{arguments}: no help")
    expect("xample" in out or arguments[0] == "units", f"{arguments}: no example")
expect(run("--help", "units").stdout == run("units").stdout and "GPa" in run("units").stdout, "units page")
expect("stillcoat 0" in run("--version").stdout, "version")
expect("17.8" in run("materials", "silicon").stdout, "a material's page shows its table")
expect("9.23" in run("materials", "silicon", "thermal_expansion", "--temperature", "124 K").stdout, "a property")

# A material file to fill in is accepted as it stands, filled in, and with each form of a datum.
with tempfile.TemporaryDirectory() as folder:
    folder = pathlib.Path(folder)
    run("materials", "--template", "--out", folder / "my-film.toml")
    template = (folder / "my-film.toml").read_text()
    expect(run("materials", "--template").stdout == template, "the template differs from its file")
    expect("not in references.toml" in run("materials", "--check", folder / "my-film.toml", code=2).stderr,
           "the template without its references")
    head = template.split("# 2. ")[1].split("# 3. ")[0].splitlines()[1:]
    (folder / "references.toml").write_text("\n".join(line[1:].strip() for line in head) + "\n")
    (folder / "n.csv").write_text("wavelength_nm,refractive_index\n600,2.12\n1550,2.06\n")
    expect("no problems, 1 property table" in run("materials", "--check", folder / "my-film.toml").stdout, "the template")
    uncommented = "\n".join(line[1:] if line[:1] == "#" and line[1:2].strip() else line for line in template.splitlines())
    def without(text, *tables):
        parts = text.split("\n[")
        return "\n[".join(part for part in parts if part.split("]")[0] not in tables)
    for left_out, count in ((("loss_angle_bulk", "loss_angle_shear", "absorption_coefficient", "unknown", "mixture"), 12),
                            (("loss_angle", "extinction_coefficient", "unknown", "mixture"), 13),
                            (("loss_angle", "extinction_coefficient", "photoelastic_p11", "refractive_index"), 12)):
        (folder / "my-film.toml").write_text(without(uncommented, *left_out))
        said = run("materials", "--check", folder / "my-film.toml").stdout
        expect(f"no problems, {count} property tables" in said, f"the template without {left_out}: {said}")
    forms = template.split("in one of these forms")[1].split("# Its width")[0]
    index = template.split("\nwavelength_nm = [600, 800")[0] + "\n"
    rest = template.split("2.06]\n", 1)[1]
    for form in ("value = 2.10", 'same_as = "tantala-ibs"\nfactor = 1.02', "wavelength_nm = [600, 1100]\nvalues = [2.1, 2.0]",
                 'wavelength_csv = "n.csv"', "sellmeier_strength = [1.1]\nsellmeier_resonance_um = [0.09]",
                 "cauchy = [2.05, 0.015, 0.0]"):
        expect(form.split("\n")[0] in forms, f"the template does not name {form}")
        text = index + form + "\n" + rest.replace("[600, 1550]", "[600, 1100]")
        (folder / "my-film.toml").write_text(text.replace('medium = "vacuum"', "") if "same_as" in form else text)
        run("materials", "--check", folder / "my-film.toml")

    # A mixture as a user's file, in a design.
    (folder / "my-film.toml").write_text("""name = "my-film"
title = "silica with a quarter of titania"
form = "film"
composition = "SiO2 and TiO2"
[mixture]
of = ["silica-ibs", "titania-ibs"]
volume_fraction = 0.25
source = ["bench-note"]
""")
    expect("no problems, 8 property tables" in run("materials", "--check", folder / "my-film.toml").stdout, "a mixture")
    page = run("materials", "my-film", "--materials", folder).stdout
    expect("75 % silica-ibs and 25 % titania-ibs by volume" in page and "Bruggeman, Ann. Phys. 416" in page, page)
    page = run("materials", "my-film", "youngs_modulus", "--materials", folder).stdout
    expect("R. Hill, Proc. Phys. Soc." in page and "Young's modulus of titania-ibs" in page, page)
    (folder / "designs").mkdir()
    mixed = folder / "designs/mixed.toml"
    mixed.write_text(design.read_text().replace("titania-tantala-ibs", "my-film"))
    page = " ".join(run("appraise", mixed, "--materials", folder).stdout.split())
    expect("a mixture's loss angle follows from no rule: give it" in page and "P. S. Turner" in page, page)

# The library's value times a factor: both sources stand in the result.
factor = design.read_text() + '[material."silica-ibs"]\nyoungs_modulus = { times = 1.1, source = "witness sample (invented)" }\n'
changed = " ".join(run("appraise", "-", stdin=factor).stdout.split())
expect("witness sample (invented): Young's modulus of silica-ibs (the library's times 1.1" in changed
       and "Young's modulus of silica-ibs (library)" in changed, changed)
expect("unknown material" not in changed and "as silica-ibs (library)" not in changed, "the kept name in the wrong place")
expect("(library)" not in run("materials").stdout, "the kept name is listed")

print("\n".join(faults) or "all command lines as expected")
sys.exit(1 if faults else 0)
