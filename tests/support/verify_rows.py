#!/usr/bin/env python3
"""Checks exported rows against their value_sha256, by the text of the page docs/conventions alone.

usage: verify_rows.py ROWS.csv INPUTS.json

ROWS.csv is an export as the API gives it, INPUTS.json the answer of the call value-inputs for the same rows. Each row's canonical
text is made anew from its cells and its inputs and hashed. Prints one line a row that does not give its hash; exit 0 when all do,
1 when one does not, 2 for wrong usage or a file that cannot be read. Standard library only.
"""
import csv
import hashlib
import json
import sys

FORM = "weighhouse-value-2"

NUMBERS = """density_kg_m3 areal_density_kg_m2 area_m2 volume_m3 mass_kg com_x_m com_y_m com_z_m ixx_kg_m2 iyy_kg_m2 izz_kg_m2
ixy_kg_m2 ixz_kg_m2 iyz_kg_m2 i1_kg_m2 i2_kg_m2 i3_kg_m2 axes_quat_w axes_quat_x axes_quat_y axes_quat_z numeric_error""".split()


def text(value):
    """A text as JSON, escaped as ECMAScript escapes it; an empty one is not given."""
    return "null" if value in (None, "") else json.dumps(value, ensure_ascii=False)


def number(cell):
    """A cell's number stands in the canonical text as it stands in the file; a zero has no sign there."""
    if cell == "":
        return "null"
    float(cell)
    return "0" if cell == "-0" else cell


def ecmascript(value):
    """A double of the inputs as ECMAScript writes it."""
    if value is None:
        return "null"
    if isinstance(value, int):
        return str(value)
    digits = repr(value)
    sign, digits = ("-", digits[1:]) if digits[0] == "-" else ("", digits)
    mantissa, _, exponent = digits.partition("e")
    whole, _, rest = mantissa.partition(".")
    figures = (whole + rest).lstrip("0")
    point = len(whole) + int(exponent or 0) - (len(whole + rest) - len(figures))
    figures = figures.rstrip("0")
    if not figures:
        return "0"
    if 0 < point <= 21:
        body = figures.ljust(point, "0") if len(figures) <= point else figures[:point] + "." + figures[point:]
    elif -6 < point <= 0:
        body = "0." + "0" * -point + figures
    else:
        power = point - 1
        body = figures[0] + ("." + figures[1:] if len(figures) > 1 else "") + "e" + ("+" if power > 0 else "-") + str(abs(power))
    return sign + body


def any_json(value):
    if isinstance(value, list):
        return "[" + ",".join(any_json(one) for one in value) + "]"
    if isinstance(value, str):
        return json.dumps(value, ensure_ascii=False)
    if isinstance(value, bool):
        return "true" if value else "false"
    return ecmascript(value)


def canonical(row, inputs):
    entries = [
        text(FORM),
        any_json(inputs["geometry"]),
        "[" + text(row["asset"]) + "," + text(row["part"]) + "]",
        ecmascript(inputs["metres_per_unit"]),
        number(row["scale"]),
        text(row["construction"]),
        number(row["wall_m"]),
        number(row["target_mass_kg"]),
        ecmascript(inputs["density_set_kg_m3"]),
        any_json(inputs["material"]),
        ecmascript(inputs["areal_density_set_kg_m2"]),
        text(row["variant"]),
        text(inputs["cavities"]),
        text(row["up_axis"]),
        "[" + ",".join(number(row[name]) for name in NUMBERS) + "," + json.dumps(row["free_axes"]) + "]",
    ]
    return "[" + ",".join(entries) + "]"


def faults(rows, inputs):
    known = {(one["part_id"], one["value_sha256"]): one for one in inputs["items"]}
    for line, row in rows:
        name = row["asset"] + "/" + row["part"]
        if row["value_sha256"] == "":
            if row["mass_kg"] != "":
                yield f"line {line}: {name} has a mass and no hash"
            continue
        found = known.get((row["part_id"], row["value_sha256"]))
        if found is None:
            yield f"line {line}: {name} has no inputs under its hash"
            continue
        if (row["material"] or None) != (found["material"][0] if found["material"] else None):
            yield f"line {line}: {name} names another material than its inputs"
        try:
            made = hashlib.sha256(canonical(row, found).encode("utf-8")).hexdigest()
        except ValueError as error:
            yield f"line {line}: {name}: {error}"
            continue
        if made != row["value_sha256"]:
            yield f"line {line}: {name} does not give its hash"


def main(arguments):
    if len(arguments) != 2:
        print(__doc__, file=sys.stderr)
        return 2
    try:
        with open(arguments[0], encoding="utf-8", newline="") as file:
            reader = csv.DictReader(file)
            rows = [(reader.line_num, row) for row in reader]
        with open(arguments[1], encoding="utf-8") as file:
            inputs = json.load(file)
    except (OSError, ValueError, csv.Error) as error:
        print(error, file=sys.stderr)
        return 2
    if inputs.get("form") != FORM:
        print(f"the inputs are of the form {inputs.get('form')}, this program knows {FORM}", file=sys.stderr)
        return 2
    found = list(faults(rows, inputs))
    for fault in found:
        print(fault)
    print(f"{len(rows)} rows, {len(found)} faults")
    return 1 if found else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
