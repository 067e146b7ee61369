"""Command lines that must work, and what they must say."""
import csv
import io
import json
import pathlib
import subprocess
import sys
import tempfile

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
table = list(csv.DictReader(io.StringIO(run("appraise", design, "--csv", "noise").stdout)))
expect([float(r["frequency_Hz"]) for r in table] == document["noise"]["frequencies_Hz"], "CSV and JSON frequencies differ")
expect([float(r["total_psd_m2_per_Hz"]) for r in table] == document["noise"]["total_psd_m2_per_Hz"],
       "CSV and JSON totals differ")
total = [sum(t["psd_m2_per_Hz"][i] for t in document["noise"]["terms"] if t["in_total"]) for i in range(len(table))]
expect(all(abs(a / b - 1) < 1e-12 for a, b in zip(total, document["noise"]["total_psd_m2_per_Hz"])),
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

for arguments in (["--help"], ["appraise", "--help"], ["materials", "--help"], ["units", "--help"]):
    out = run(*arguments).stdout
    expect("Usage" in out, f"{arguments}: no help")
    expect("xample" in out or arguments[0] == "units", f"{arguments}: no example")
expect(run("--help", "units").stdout == run("units").stdout and "GPa" in run("units").stdout, "units page")
expect("stillcoat 0" in run("--version").stdout, "version")
expect("17.8" in run("materials", "silicon").stdout, "a material's page shows its table")
expect("9.23" in run("materials", "silicon", "thermal_expansion", "--temperature", "124 K").stdout, "a property")

print("\n".join(faults) or "all command lines as expected")
sys.exit(1 if faults else 0)
