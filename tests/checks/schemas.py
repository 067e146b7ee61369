"""Material files, example designs and the JSON of each example hold to their schemas; no NaN in any output."""
import json
import pathlib
import subprocess
import sys
import tomllib

import jsonschema

root, program = pathlib.Path(sys.argv[1]), sys.argv[2]
schemas = {p.name.split(".")[0]: json.loads(p.read_text()) for p in (root / "src/present/schemas").glob("*.schema.json")}
failed = 0
checked = 0


def refuse_constant(word):
    raise ValueError(f"{word} is not JSON")


def check(kind, document, name):
    global failed, checked
    checked += 1
    validator = jsonschema.validators.validator_for(schemas[kind])(schemas[kind])
    for error in validator.iter_errors(document):
        failed += 1
        print(f"{name}: {'/'.join(map(str, error.absolute_path))}: {error.message[:200]}")


for schema in schemas.values():
    jsonschema.validators.validator_for(schema).check_schema(schema)
for file in sorted((root / "materials").glob("*.toml")):
    check("references" if file.name == "references.toml" else "material", tomllib.loads(file.read_text()), file.name)
for folder in sorted((root / "examples").glob("*/")):
    design = folder / "design.toml"
    check("design", tomllib.loads(design.read_text()), folder.name)
    run = subprocess.run([program, "appraise", "--json", str(design)], capture_output=True, text=True)
    if run.returncode != 0:
        failed += 1
        print(f"{folder.name}: exit {run.returncode}: {run.stderr}")
        continue
    check("appraisal", json.loads(run.stdout, parse_constant=refuse_constant), folder.name)
    run = subprocess.run([program, "sweep", "--json", str(design), "--over", "temperature=250K:320K:8", "--show",
                          "transmittance,total_psd_m2_per_Hz" + ("_s" if "turning" in folder.name else "")],
                         capture_output=True, text=True)
    check("sweep", json.loads(run.stdout, parse_constant=refuse_constant), folder.name + ", sweep")
print(f"{checked} documents checked, {failed} faults")
sys.exit(1 if failed or checked < 10 else 0)
