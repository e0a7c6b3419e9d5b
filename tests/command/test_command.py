"""The command zeotrope end to end: what it prints, where, and the exit codes.

ZEOTROPE_COMMAND names the executable. Published figures come from tests/published; each check names its source.
"""

import csv
import json
import math
import os
import re
import shutil
import subprocess
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]
PUBLISHED = ROOT / "tests" / "published"
FLUIDS = ROOT / "fluids"

OK, INTERNAL, USAGE, NO_STATE, CHECK_FAILED, BAD_FILE = range(6)
SUBCOMMANDS = ["chart", "point", "reading", "list", "about", "verify"]


def executable() -> str:
    path = os.environ.get("ZEOTROPE_COMMAND")
    if not path:
        pytest.fail("ZEOTROPE_COMMAND is not set: it names the executable to test, e.g. build/release/zeotrope")
    if shutil.which(path) is None:
        pytest.fail(f"ZEOTROPE_COMMAND is {path}, which is no executable")
    return str(Path(path).resolve())


def run(*arguments: str, **environment: str) -> subprocess.CompletedProcess[str]:
    env = {k: v for k, v in os.environ.items() if k != "ZEOTROPE_FLUIDS"} | environment
    return subprocess.run([executable(), *arguments], capture_output=True, text=True, encoding="utf-8", env=env, timeout=120)


def output(*arguments: str, code: int = OK, **environment: str) -> str:
    r = run(*arguments, **environment)
    assert r.returncode == code, r.stderr
    assert r.stderr == ""
    assert "\x1b" not in r.stdout
    return r.stdout


def error(*arguments: str, code: int = USAGE, **environment: str) -> str:
    """The message; nothing may stand on standard output then."""
    r = run(*arguments, **environment)
    assert r.returncode == code, r.stdout + r.stderr
    assert r.stdout == ""
    assert r.stderr.startswith("zeotrope: ")
    assert r.stderr.count("\n") == 1
    return r.stderr


def number_after(label: str, text: str) -> float:
    m = re.search(re.escape(label) + r"\s*:?\s*([-+]?[0-9.]+)", text)
    assert m, f"no figure after {label!r} in:\n{text}"
    return float(m.group(1))


def cells(label: str, text: str) -> list[float]:
    """The figures of the row that starts with `label`."""
    line = next((x for x in text.splitlines() if x.startswith(label)), None)
    assert line is not None, f"no row {label!r} in:\n{text}"
    return [float(x) for x in re.findall(r"(?<![\w.])-?[0-9]+\.[0-9]+", line[len(label):])]


def kilopascals(text: str) -> list[float]:
    """The full absolute pressures of `point`, bubble first."""
    return [float(x) for x in re.findall(r"([0-9.]+) kPa\(a\)", text)]


def published(file: str) -> list[dict[str, str]]:
    lines = [x for x in (PUBLISHED / file).read_text(encoding="utf-8").splitlines() if not x.startswith("#")]
    return list(csv.DictReader(lines))


def half_step(printed: str) -> float:
    """Half a unit of the last printed digit."""
    return 0.5 * 10.0 ** -len(printed.partition(".")[2])


# ---- point


# tests/published/saturation_R134a.csv, source "ashrae": ASHRAE Handbook - Fundamentals (SI), chapter 30; last printed digit
ASHRAE_R134A = [r for r in published("saturation_R134a.csv") if r["source"] == "ashrae" and float(r["t_C"]) in (-40, -10, 0, 20, 40, 70)]


@pytest.mark.parametrize("row", ASHRAE_R134A, ids=lambda r: r["t_C"] + "C")
def test_point_r134a_against_ashrae(row: dict[str, str]) -> None:
    text = output("point", "R-134a", "--temperature", row["t_C"] + "C")
    assert kilopascals(text)[0] == pytest.approx(float(row["p_bubble_kPa"]), abs=1.02 * half_step(row["p_bubble_kPa"]))
    liquid, vapour = cells("density, kg/m3", text)
    assert liquid == pytest.approx(float(row["rho_l_kgm3"]), abs=1.02 * half_step(row["rho_l_kgm3"]))
    assert 1 / vapour == pytest.approx(float(row["v_v_m3kg"]), abs=1.02 * half_step(row["v_v_m3kg"]))


# the same table: its row of 101.325 kPa is at -26.07 C
def test_boiling_point_of_r134a_against_ashrae() -> None:
    text = output("point", "R-134a", "--pressure", "101.325 kPa")
    assert cells("temperature, °C", text)[0] == pytest.approx(-26.07, abs=0.0051)


# common practice, no source: R-12 boils at about -21 F, water at 212 F, both at one atmosphere (0 psig at sea level)
@pytest.mark.parametrize(("name", "fahrenheit", "within"), [("R-12", -21.0, 1.0), ("water", 212.0, 0.1)])
def test_boiling_points_of_common_practice(name: str, fahrenheit: float, within: float) -> None:
    text = output("point", name, "--pressure", "0 psig", "--temperature-unit", "F")
    assert cells("temperature, °F", text)[0] == pytest.approx(fahrenheit, abs=within)


# tests/published/blend_normal_points.csv: ANSI/ASHRAE Standard 34, printed to 0.1 C; that file allows 0.5 K
@pytest.mark.parametrize("name", ["R-404A", "R-407C", "R-410A"])
def test_normal_points_of_blends(name: str) -> None:
    row = next(r for r in published("blend_normal_points.csv") if r["designation"] == name)
    bubble, dew = cells("temperature, °C", output("point", name, "--pressure", "101.325 kPa"))
    assert bubble == pytest.approx(float(row["bubble_C"]), abs=0.5)
    assert dew == pytest.approx(float(row["dew_C"]), abs=0.5)


def test_point_of_a_blend() -> None:
    text = output("point", "R-454B", "--temperature", "5C")
    bubble, dew = kilopascals(text)
    assert bubble > dew  # at one temperature the bubble pressure is the higher
    bubble_liquid, bubble_vapour, dew_liquid, dew_vapour = cells("R-32, % by mass", text)
    assert bubble_liquid == dew_vapour == 68.9  # composition of the designation, ANSI/ASHRAE Standard 34
    assert bubble_vapour > 68.9 > dew_liquid  # R-32 is the more volatile
    for basis in ("mass", "mole"):
        for column in zip(cells(f"R-32, % by {basis}", text), cells(f"R-1234yf, % by {basis}", text)):
            assert sum(column) == pytest.approx(100, abs=0.0011)
    assert number_after("glide", text) > 0
    mismatch = re.search(r"fugacity check: .* is ([-0-9.e+]+);", text)
    assert mismatch and float(mismatch.group(1)) < 1e-9
    assert "sea level, 101.325 kPa" in text


def test_point_by_pressure_gives_back_the_temperature() -> None:
    pressure = kilopascals(output("point", "R-407C", "--temperature", "-5C"))[1]
    text = output("point", "R-407C", "--pressure", f"{pressure} kPa(a)")
    assert cells("temperature, °C", text)[1] == pytest.approx(-5, abs=2e-3)


def test_recipe_equals_designation() -> None:
    named = kilopascals(output("point", "R-454B", "--temperature", "20C"))
    assert kilopascals(output("point", "R-32 68.9 + R-1234yf 31.1", "--temperature", "20C")) == named
    assert kilopascals(output("point", "R-32", "68.9", "+", "R-1234yf", "31.1", "--temperature", "20C")) == named
    assert kilopascals(output("point", "R-32 0.689 + R-1234yf 0.311", "--temperature", "20C")) == named
    assert kilopascals(output("point", "R-32 137.8 + R-1234yf 62.2", "--normalise", "--temperature", "20C")) == named


def test_recipe_by_mole() -> None:
    text = output("point", "R-290 50 + R-600a 50", "--mole", "--temperature", "0C")
    assert cells("R-290, % by mole", text)[0] == 50
    # molar masses 44.096 and 58.122 g/mol (IUPAC atomic weights)
    assert cells("R-290, % by mass", text)[0] == pytest.approx(100 * 44.096 / (44.096 + 58.122), abs=0.01)


@pytest.mark.parametrize("spelling", ["R-454B", "454b", "r454B", "R 454B"])
def test_spellings_of_a_designation(spelling: str) -> None:
    assert output("point", spelling, "--temperature", "5C").startswith("R-454B at 5.00 °C")


def test_negative_values_of_options() -> None:
    text = output("point", "R-134a", "--temperature", "-5C")
    assert text == output("point", "R-134a", "--temperature=-5C")
    assert cells("temperature, °C", text)[0] == -5
    assert "-0.30 bar(g)" in output("reading", "R-134a", "--gauge", "-0.3 bar(g)", "--line", "-20C")
    assert json.loads(output("chart", "R-134a", "--from", "-40", "--to", "-35", "--format", "json"))


def test_extrapolated_points_are_marked() -> None:
    assert "below the published range" in error("point", "R-1234yf", "--temperature", "-60C", code=NO_STATE)
    assert "extrapolated" in output("point", "R-1234yf", "--temperature", "-60C", "--extrapolate")
    assert "extrapolated" not in output("point", "R-1234yf", "--temperature", "0C", "--extrapolate")


# ---- reading


# saturation_R134a.csv, "ashrae": 414.61 kPa at 10 C and 1016.6 kPa at 40 C; the unit in which they are typed does not matter
@pytest.mark.parametrize(("kilopascal", "saturation"), [(414.61, 10.0), (1016.6, 40.0)])
@pytest.mark.parametrize("unit", ["kPa(a)", "bar(g)", "psig", "kgf/cm2(g)"])
def test_reading_r134a(kilopascal: float, saturation: float, unit: str) -> None:
    size = {"kPa(a)": 1.0, "bar(g)": 100.0, "psig": 6.894757, "kgf/cm2(g)": 98.0665}[unit]  # kPa; NIST SP 811
    figure = (kilopascal - (0 if unit == "kPa(a)" else 101.325)) / size
    text = output("reading", "R-134a", "--gauge", f"{figure:.5f} {unit}", "--line", f"{saturation + 6}C", "--suction")
    assert number_after("superheat", text) == pytest.approx(6.0, abs=0.051)
    text = output("reading", "R-134a", "--gauge", f"{figure:.5f} {unit}", "--line", f"{saturation - 5}C", "--liquid")
    assert number_after("subcooling", text) == pytest.approx(5.0, abs=0.051)
    assert "WARNING" not in text


def test_reading_says_which_column_it_used() -> None:
    text = output("reading", "R-454B", "--gauge", "118 psig", "--line", "55F")
    suction, liquid = text.split("\nliquid line:")
    assert "column used: dew (vapour)" in suction
    assert "column used: bubble (liquid)" in liquid
    bubble, dew, line = number_after("bubble (liquid)", text), number_after("dew (vapour)", text), 55
    assert number_after("glide", text) == pytest.approx(dew - bubble, abs=0.11)
    assert number_after("superheat", text) == pytest.approx(line - dew, abs=0.11)
    assert number_after("subcooling", text) == pytest.approx(bubble - line, abs=0.11)
    assert dew > bubble
    assert "column" not in output("reading", "R-134a", "--gauge", "118 psig", "--line", "95F")  # a pure fluid has one


def test_superheat_and_subcooling_have_no_offset_in_fahrenheit() -> None:
    celsius = output("reading", "R-407C", "--gauge", "4.5 bar(g)", "--line", "15C", "--suction")
    fahrenheit = output("reading", "R-407C", "--gauge", "4.5 bar(g)", "--line", "59F", "--suction")
    assert number_after("superheat", fahrenheit) == pytest.approx(1.8 * number_after("superheat", celsius), abs=0.15)


def test_reading_warns() -> None:
    suction = output("reading", "R-407C", "--gauge", "4.5 bar(g)", "--line", "0C", "--suction")
    assert number_after("superheat", suction) < 0
    assert "WARNING: below the dew point" in suction
    assert "subcooling" not in suction
    liquid = output("reading", "R-407C", "--gauge", "15 bar(g)", "--line", "40C", "--liquid")
    assert number_after("subcooling", liquid) < 0
    assert "WARNING: above the bubble point" in liquid
    assert "superheat" not in liquid
    assert "liquid and vapour together" in output("reading", "R-407C", "--gauge", "5 bar(g)", "--line", "5C")


def test_gauge_reads_against_the_air_around_it() -> None:
    def saturation(*options: str) -> float:
        return number_after("saturation", output("reading", "R-134a", "--gauge", "1 bar(g)", "--line", "10C", *options))

    # ISO 2533:1975: 84.556 kPa at 1500 m
    assert saturation("--altitude", "1500") == saturation("--barometer", "84.556 kPa") < saturation()
    assert saturation("--altitude", "1500") == saturation("--altitude", "4921.26 ft")
    # a barometer's inches count from zero, a vacuum gauge's downward; 29.92 inHg is the standard atmosphere
    assert saturation("--barometer", "29.92 inHg") == saturation("--barometer", "1013.25 hPa") == saturation()
    text = output("reading", "R-134a", "--gauge", "1 bar(g)", "--line", "10C", "--altitude", "1500")
    assert "gauge zero: 1500 m above the sea, 84.556 kPa by the standard atmosphere" in text
    assert "gauge zero: by barometer, 98.200 kPa" in output("reading", "R-134a", "--gauge", "1 bar(g)", "--line", "10C", "--barometer", "98.2 kPa")


def test_vacuum_is_told_in_inches_of_mercury() -> None:
    # 1 psi is 2.036 inHg (NIST SP 811)
    assert "10.2 inHg vac" in output("reading", "R-134a", "--gauge", "-5 psig", "--line", "-20F", "--suction")
    assert "5.0 inHg vac" in output("reading", "R-134a", "--gauge", "5 inHg", "--line", "-20F", "--suction")


# ---- chart


def test_chart_in_text() -> None:
    text = output("chart", "R-454B", "--from", "0", "--to", "10")
    assert "R-454B" in text and "sea level, 101.325 kPa" in text
    assert "A2L" in text
    for t in ("0", "5", "10"):
        assert re.search(rf"^\s*{t}\s+[0-9.]+", text, re.MULTILINE)


def chart_rows(*arguments: str) -> list[dict[str, str]]:
    lines = [x for x in output("chart", *arguments, "--format", "csv").splitlines() if not x.startswith("#")]
    return list(csv.DictReader(lines))


def test_chart_in_csv() -> None:
    rows = chart_rows("R-454B", "--from", "-40", "--to", "60", "--step", "2")
    assert len(rows) == 51
    first = list(rows[0].values())
    assert float(first[0]) == -40
    pressures = [float(list(r.values())[1]) for r in rows]
    assert pressures == sorted(pressures)


def test_chart_rows_against_ashrae() -> None:
    # saturation_R134a.csv, "ashrae"; last printed digit
    table = {float(r["t_C"]): r["p_bubble_kPa"] for r in published("saturation_R134a.csv") if r["source"] == "ashrae"}
    rows = chart_rows("R-134a", "--from", "-40", "--to", "60", "--step", "20", "--pressure-unit", "kPa(a)")
    assert len(rows) == 6
    compared = 0
    for row in rows:
        t, p = (float(x) for x in list(row.values())[:2])
        if t in table:
            assert p == pytest.approx(float(table[t]), abs=1.02 * half_step(table[t]))
            compared += 1
    assert compared >= 5


def test_chart_in_json() -> None:
    chart = json.loads(output("chart", "R-410A", "--from", "0", "--to", "40", "--step", "10", "--format", "json"))
    assert chart["identity"]["name"] == "R-410A"
    assert len(chart["rows"]) == 5


def test_chart_as_card() -> None:
    page = output("chart", "R-290", "--format", "card")
    assert page.lower().startswith("<!doctype html>")
    assert "R-290" in page
    assert page.rstrip().endswith("</html>")
    assert not re.search(r"(src|href)\s*=\s*[\"']?https?:", page)  # works offline


def test_chart_by_pressure_in_several_units() -> None:
    text = output("chart", "R-407C", "--by", "pressure", "--pressure-unit", "psig,kPa(a)", "--pressure-unit", "bar(g)", "--from", "0", "--to", "100", "--step", "20")
    for unit in ("psig", "kPa(a)", "bar(g)"):
        assert unit in text


@pytest.mark.parametrize(("extension", "start"), [(".csv", "#"), (".json", "{"), (".html", "<!"), (".txt", "R-134a")])
def test_output_file(tmp_path: Path, extension: str, start: str) -> None:
    file = tmp_path / ("mine" + extension)
    assert output("chart", "R-134a", "--output", str(file)) == ""
    text = file.read_text(encoding="utf-8")
    assert text.startswith(start)
    form = {".csv": "csv", ".json": "json", ".html": "card", ".txt": "text"}[extension]
    assert text == output("chart", "R-134a", "--format", form)


def test_format_outweighs_the_extension(tmp_path: Path) -> None:
    file = tmp_path / "mine.csv"
    output("chart", "R-134a", "--format", "json", "--output", str(file))
    assert json.loads(file.read_text(encoding="utf-8"))


def test_output_file_that_cannot_be_written(tmp_path: Path) -> None:
    assert "cannot be written" in error("chart", "R-134a", "--output", str(tmp_path / "no" / "such.csv"))
    assert "cannot be written" in error("chart", "R-134a", "--output", str(tmp_path))


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="no /dev/full here")
def test_a_full_disc_is_not_passed_over() -> None:
    assert "not written in full" in error("chart", "R-134a", "--output", "/dev/full", code=INTERNAL)
    with open("/dev/full", "w") as full:
        r = subprocess.run([executable(), "chart", "R-134a"], stdout=full, stderr=subprocess.PIPE, text=True)
    assert r.returncode == INTERNAL
    assert "standard output cannot be written" in r.stderr


def test_a_refused_chart_leaves_an_old_file_alone(tmp_path: Path) -> None:
    file = tmp_path / "old.csv"
    file.write_text("old")
    error("chart", "R-454X", "--output", str(file))
    assert file.read_text() == "old"


# ---- list, about


def test_list() -> None:
    text = output("list")
    assert "R-134a" in text and "R-454B" in text
    fluids = output("list", "fluids")
    assert "R-134a" in fluids and "R-454B" not in fluids
    blends = output("list", "blends", "R-32")
    assert "R-454B" in blends and "R-404A" not in blends  # R-404A has no R-32
    assert {x.split()[0] for x in output("list", "407").splitlines()[1:]} >= {"R-407A", "R-407C", "R-407F"}
    assert "R-290" in output("list", "propane")
    assert "R-12 " not in output("list", "A2L") and "R-1234yf" in output("list", "A2L")
    names = [x.split()[0] for x in fluids.splitlines()]
    assert names.index("R-12") < names.index("R-123") < names.index("R-1234yf")
    assert "fits \"zzzz\"" in error("list", "zzzz")


def test_about_a_blend() -> None:
    text = output("about", "R-454B")
    assert "safety group: A2L" in text
    # R-32 675, R-1234yf 4: IPCC AR4, table 2.14 and the practice for R-1234yf; by mass
    assert number_after("IPCC AR4", text) == round(0.689 * 675 + 0.311 * 4)
    assert "R-32 / R-1234yf" in text and "source:" in text and "provenance:" in text
    assert re.search(r"critical point: [0-9.]+ °C", text)
    # published -50.9 and -50.0 C: ANSI/ASHRAE Standard 34
    assert re.search(r"bubble point\s+-5[01]\.\d+ °C\s+-50\.9 °C", text)
    assert re.search(r"dew point\s+-[45]\d\.\d+ °C\s+-50\.0 °C", text)
    assert "Cautions (long form: --cautions)" in text
    long = output("about", "R-454B", "--cautions")
    assert len(long) > 1.5 * len(text)


def test_about_a_pure_fluid() -> None:
    text = output("about", "carbon dioxide")
    assert text.startswith("R-744\n")
    # Span and Wagner 1996: 304.1282 K (30.98 C), 7.3773 MPa
    assert number_after("critical point", text) == pytest.approx(30.98, abs=0.011)
    assert "73.77 bar(a)" in text
    assert "Pairs" not in text


def test_about_a_new_blend_marks_what_is_estimated() -> None:
    text = output("about", "R-13I1 50 + R-E170 50")
    assert "new blend" in text
    assert "estimated" in text and "NO DATA" in text


def test_about_goes_on_where_a_figure_cannot_be_had() -> None:
    text = output("about", "R-13I1 50 + R-718 50")
    assert "no figure" in text and "Equations" in text


# ---- verify


def test_verify_passes() -> None:
    text = output("verify", "R-32")
    for column in ("computed", "published", "deviation", "within"):
        assert column in text
    assert "all within their stated agreement" in text.splitlines()[-1]
    quiet = output("verify", "R-32", "--quiet")
    assert quiet == text.splitlines()[-1] + "\n"
    assert "2 fluids" in output("verify", "R-454B", "--quiet")  # its components


def test_verify_a_file(tmp_path: Path) -> None:
    file = tmp_path / "mine.toml"
    good = (FLUIDS / "compounds" / "R-601b.toml").read_text(encoding="utf-8")
    file.write_text(good, encoding="utf-8")
    assert "all within" in output("verify", str(file))

    # one printed digit of the check pressure changed
    assert "pressure = 3256677.0" in good
    file.write_text(good.replace("pressure = 3256677.0", "pressure = 3257677.0"), encoding="utf-8")
    text = output("verify", str(file), "--failures", code=CHECK_FAILED)
    assert "FAILED" in text and "3257677" in text
    assert " ok\n" not in text
    assert "1 FAILED" in output("verify", str(file), "--quiet", code=CHECK_FAILED)

    file.write_text(good.replace("kind = \"helmholtz\"", "kind = 3"), encoding="utf-8")
    message = error("verify", str(file), code=BAD_FILE)
    assert "mine.toml:" in message and "kind" in message
    file.write_text("[identity\n", encoding="utf-8")
    assert "mine.toml:1" in error("verify", str(file), code=BAD_FILE)
    assert "there is no file" in error("verify", str(tmp_path / "none.toml"))


def test_verify_needs_something() -> None:
    assert "--all" in error("verify")
    assert "only one" in error("verify", "R-32", "--quiet", "--failures")
    assert "R-454B" in error("verify", "R-454X")


# ---- folders


def test_own_folder_comes_first(tmp_path: Path) -> None:
    (tmp_path / "compounds").mkdir()
    text = (FLUIDS / "compounds" / "R-290.toml").read_text(encoding="utf-8")
    name = re.search(r'chemical_name = "([^"]*)"', text)
    assert name
    (tmp_path / "compounds" / "R-290.toml").write_text(text.replace(name.group(0), 'chemical_name = "propane of mine"'), encoding="utf-8")
    for arguments in (["--fluids", str(tmp_path), "about", "R-290"], ["about", "R-290", "--fluids", str(tmp_path)]):
        assert "propane of mine" in output(*arguments)
    assert "propane of mine" in output("about", "R-290", ZEOTROPE_FLUIDS=str(tmp_path))
    assert "propane of mine" not in output("about", "R-290")
    (tmp_path / "compounds" / "R-290.toml").write_text("nonsense", encoding="utf-8")
    assert "R-290.toml:1" in error("--fluids", str(tmp_path), "point", "R-290", "--temperature", "0C", code=BAD_FILE)


def test_folder_that_is_not_there(tmp_path: Path) -> None:
    assert "no such folder" in error("--fluids", str(tmp_path / "none"), "list")
    assert "ZEOTROPE_FLUIDS" in error("list", ZEOTROPE_FLUIDS=str(tmp_path / "none"))


# ---- what is refused


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        ([], ["--help"]),
        (["paint"], ["--help"]),
        (["chart"], ["REFRIGERANT", "zeotrope chart --help"]),
        (["chart", ""], ["no refrigerant given"]),
        (["chart", "R-134a", "--colour", "red"], ["--colour"]),
        (["chart", "R-454X"], ["R-454X", "R-454B"]),
        (["chart", "R-1234ze"], ["R-1234ze(E)", "R-1234ze(Z)"]),
        (["chart", "R-32 50 + R-125 40"], ["90", "100", "--normalise"]),
        (["chart", "R-32 50 + R-32 50"], ["R-32", "twice"]),
        (["chart", "R-32 + R-125"], ["NAME FIGURE"]),
        (["chart", "R-32 -5 + R-125 105"], ["-5"]),
        (["chart", "R-32 68.9 + R-1234y 31.1"], ["R-1234yf"]),
        (["chart", "R-134a", "--mole"], ["--mole", "recipe"]),
        (["chart", "R-10"], ["R-10", "equation"]),
        (["chart", "R-134a", "--pressure-unit", "psi"], ["psig or psia"]),
        (["chart", "R-134a", "--pressure-unit", "psig,bar"], ["bar(g) or bar(a)"]),
        (["chart", "R-134a", "--pressure-unit", "furlong"], ["furlong", "bar(g)"]),
        (["chart", "R-134a", "--temperature-unit", "X"], ["K, C or F"]),
        (["chart", "R-134a", "--from", "cold"], ["--from", "cold", "°C"]),
        (["chart", "R-134a", "--from", "nan"], ["--from"]),
        (["chart", "R-134a", "--from", "10", "--to", "0"], ["from 10 to 0"]),
        (["chart", "R-134a", "--step", "0"], ["step"]),
        (["chart", "R-134a", "--step", "1e-9"], ["20000"]),
        (["chart", "R-134a", "--by", "colour"], ["temperature or pressure"]),
        (["chart", "R-134a", "--format", "pdf"], ["text, csv, json or card"]),
        (["chart", "R-134a", "--altitude", "99999"], ["99999", "11000"]),
        (["chart", "R-134a", "--altitude", "3 miles"], ["m or ft"]),
        (["chart", "R-134a", "--barometer", "14.7 psig"], ["absolute"]),
        (["chart", "R-134a", "--barometer", "98.2"], ["unit"]),
        (["chart", "R-134a", "--barometer", "98.2 Pa"], ["0.0982 kPa"]),
        (["chart", "R-134a", "--barometer", "98.2 kPa", "--altitude", "100"], ["only one"]),
        (["point", "R-134a"], ["exactly one"]),
        (["point", "R-134a", "--temperature", "5C", "--pressure", "1 bar(g)"], ["exactly one"]),
        (["point", "R-134a", "--temperature", "5"], ["unit"]),
        (["point", "R-134a", "--temperature", "-300C"], ["absolute zero"]),
        (["point", "R-134a", "--pressure", "118 psi"], ["--pressure", "psig or psia"]),
        (["point", "R-134a", "--pressure", "1,5 bar(g)"], ["decimal point"]),
        (["point", "R-134a", "--pressure", "-2 bar(g)"], ["vacuum"]),
        (["reading", "R-134a", "--line", "5C"], ["--gauge"]),
        (["reading", "R-134a", "--gauge", "--line", "5C"], ["--line"]),
        (["reading", "R-134a", "--gauge", "118 psi", "--line", "5C"], ["--gauge", "psig or psia"]),
        (["reading", "R-134a", "--gauge", "118 psig", "--line", "5"], ["--line", "unit"]),
        (["reading", "R-134a", "--gauge", "118 psig", "--line", "5C", "--suction", "--liquid"], ["only one"]),
    ],
    ids=lambda x: " ".join(x) if isinstance(x, list) else None,
)
def test_bad_input(arguments: list[str], words: list[str]) -> None:
    message = error(*arguments)
    for word in words:
        assert word in message


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        # critical points: 101.06 C (Tillner-Roth and Baehr 1994), 30.98 C (Span and Wagner 1996)
        (["point", "R-134a", "--temperature", "200C"], ["374.2", "(101.06 °C)"]),
        (["point", "R-744", "--temperature", "35C"], ["(30.98 °C)"]),
        (["reading", "R-744", "--gauge", "1100 psig", "--line", "40C", "--liquid"], ["critical point", "(30.98 °C)"]),
        (["point", "R-454B", "--temperature", "90C"], ["bubble", "critical point"]),
        (["point", "R-454B", "--temperature", "-200C"], ["below the published range", "R-1234yf"]),
        (["chart", "R-134a", "--from", "200", "--to", "300"], ["no row", "critical temperature"]),
        (["chart", "R-134a", "--from", "-200", "--to", "-150"], ["no row", "published range"]),
    ],
    ids=lambda x: " ".join(x) if isinstance(x, list) else None,
)
def test_no_such_state(arguments: list[str], words: list[str]) -> None:
    message = error(*arguments, code=NO_STATE)
    for word in words:
        assert word in message


def test_messages_carry_no_control_characters() -> None:
    r = subprocess.run([executable(), "chart", b"R-\x1b[31m\xff"], capture_output=True)
    assert r.returncode == USAGE
    assert b"\x1b" not in r.stderr
    r.stderr.decode("utf-8")


# ---- help


def test_version() -> None:
    assert re.fullmatch(r"zeotrope \d+\.\d+\.\d+\n", output("--version"))


def test_help_tells_the_exit_codes() -> None:
    text = output("--help")
    for code in range(6):
        assert re.search(rf"^  {code}  ", text, re.MULTILINE)
    for name in SUBCOMMANDS:
        assert re.search(rf"^  {name} ", text, re.MULTILINE)


@pytest.mark.parametrize("name", SUBCOMMANDS)
def test_help_has_examples(name: str) -> None:
    text = output(name, "--help")
    assert f"zeotrope {name}" in text[text.index("Examples:"):]


def example_lines() -> list[str]:
    if not os.environ.get("ZEOTROPE_COMMAND"):
        return []
    lines = []
    for name in SUBCOMMANDS:
        text = output(name, "--help")
        lines += [x.strip() for x in text[text.index("Examples:"):].splitlines() if x.startswith("  zeotrope ")]
    return lines


def test_examples_of_the_help_work(tmp_path: Path) -> None:
    import shlex

    shutil.copy(FLUIDS / "compounds" / "R-32.toml", tmp_path / "my-fluid.toml")
    lines = example_lines()
    assert len(lines) > 15
    for line in lines:
        arguments = shlex.split(re.sub(r"\s+\([^()\"]*\)$", "", line))[1:]
        r = subprocess.run([executable(), *arguments], capture_output=True, text=True, cwd=tmp_path, timeout=120)
        allowed = (OK, CHECK_FAILED) if "--all" in arguments else (OK,)
        assert r.returncode in allowed, f"{line}\n{r.stderr}"


def test_nothing_is_not_a_number() -> None:
    """No output of the common calls holds nan or inf."""
    for arguments in (["chart", "R-744"], ["chart", "R-454B", "--by", "pressure"], ["point", "R-410A", "--temperature", "0C"], ["about", "R-449A"]):
        assert not re.search(r"\b-?(nan|inf)\b", output(*arguments), re.IGNORECASE), arguments
    assert all(math.isfinite(p) for p in kilopascals(output("point", "R-454B", "--temperature", "76.5C")))
