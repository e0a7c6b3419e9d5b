"""The package as a user meets it: names, errors, tables, threads."""

import json
import math
import pickle
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path

import numpy as np
import pandas as pd
import pytest

import zeotrope

R454B = {"R-32": 0.689, "R-1234yf": 0.311}


@pytest.fixture(scope="module")
def r454b(catalogue):
    return zeotrope.refrigerant("R-454B", catalogue=catalogue)


@pytest.fixture(scope="module")
def r134a(catalogue):
    return zeotrope.refrigerant("R-134a", catalogue=catalogue)


# ---- refrigerants


@pytest.mark.parametrize(
    ("celsius", "kilopascal", "liquid", "vapour_volume", "vapour_enthalpy", "vapour_entropy"),
    # ASHRAE Handbook - Fundamentals (SI) 2009-2017, chapter 30, refrigerant 134a; rows of
    # tests/published/saturation_R134a.csv, source ashrae
    [
        (-40, 51.21, 1417.7, 0.36108, 374.00, 1.7643),
        (0, 292.80, 1294.8, 0.06931, 398.60, 1.7271),
        (50, 1317.9, 1102.3, 0.01509, 423.44, 1.7072),
    ],
)
def test_published_saturation(r134a, celsius, kilopascal, liquid, vapour_volume, vapour_enthalpy, vapour_entropy):
    s = r134a.saturation(temperature=celsius + 273.15)
    last_digit = 10.0 ** -(1 if kilopascal > 1000 else 2)
    assert s.bubble.pressure / 1000 == pytest.approx(kilopascal, abs=0.51 * last_digit)
    assert s.dew.pressure == s.bubble.pressure
    assert s.bubble.liquid.density == pytest.approx(liquid, abs=0.051)
    assert 1 / s.dew.vapour.density == pytest.approx(vapour_volume, abs=0.51e-5)
    vapour = r134a.properties(temperature=s.dew.temperature, molar_density=s.dew.vapour.molar_density)
    assert vapour.enthalpy / 1000 == pytest.approx(vapour_enthalpy, abs=0.0051)
    assert vapour.entropy / 1000 == pytest.approx(vapour_entropy, abs=0.000051)
    assert vapour.pressure == pytest.approx(s.dew.pressure, rel=1e-9)


def test_names_and_composition(r454b):
    assert r454b.name == "R-454B"
    assert r454b.is_blend
    assert [c.designation for c in r454b.components] == ["R-32", "R-1234yf"]
    assert [c.mass_fraction for c in r454b.components] == pytest.approx([0.689, 0.311])
    assert sum(c.mole_fraction for c in r454b.components) == pytest.approx(1)
    assert r454b.mole_fractions == pytest.approx([c.mole_fraction for c in r454b.components])
    assert r454b.molar_mass == pytest.approx(sum(c.mole_fraction * c.molar_mass for c in r454b.components))
    (pair,) = r454b.pairs
    assert (pair.first, pair.second) == ("R-32", "R-1234yf")
    assert pair.kind in {"published", "fitted", "fitted, weakly determined", "estimated"}
    assert pair.estimated == pair.kind.startswith("estimated")
    assert pair.provenance


def test_blend_follows_the_designated_one(r454b, catalogue):
    by_mass = zeotrope.blend(R454B, catalogue=catalogue)
    by_mole = zeotrope.blend({c.designation: c.mole_fraction for c in r454b.components}, basis="mole", catalogue=catalogue)
    parts = zeotrope.blend({k: 100 * v for k, v in R454B.items()}, normalise=True, catalogue=catalogue)
    wanted = r454b.saturation(temperature=280.0).bubble.pressure
    for r in (by_mass, by_mole, parts):
        assert r.saturation(temperature=280.0).bubble.pressure == pytest.approx(wanted, rel=1e-9)
    assert by_mass.name == "R-32 68.9 + R-1234yf 31.1 % by mass"


def test_saturation_of_a_blend(r454b):
    s = r454b.saturation(pressure=1e6)
    assert [s.bubble.pressure, s.dew.pressure] == pytest.approx([1e6, 1e6], rel=1e-12)
    assert s.dew.temperature - s.bubble.temperature == pytest.approx(r454b.glide(pressure=1e6), abs=1e-9)
    assert 0.5 < r454b.glide(pressure=1e6) < 2.5
    assert s.bubble.liquid.mole_fractions == pytest.approx(r454b.mole_fractions)
    assert s.dew.vapour.mole_fractions == pytest.approx(r454b.mole_fractions)
    assert s.bubble.vapour.mole_fractions[0] > r454b.mole_fractions[0]  # R-32 boils off first
    for phase in (s.bubble.liquid, s.bubble.vapour, s.dew.liquid, s.dew.vapour):
        assert phase.mole_fractions.sum() == pytest.approx(1)
        assert phase.mass_fractions.sum() == pytest.approx(1)
        mass = phase.mole_fractions @ [c.molar_mass for c in r454b.components]
        assert phase.density == pytest.approx(phase.molar_density * mass)
    for point in (s.bubble, s.dew):
        assert point.fugacity_mismatch < 1e-9
        assert not point.extrapolated


def test_phases_outlive_what_they_come_from(catalogue):
    x = zeotrope.refrigerant("R-454B", catalogue=catalogue).saturation(temperature=280.0).bubble.vapour.mole_fractions
    assert x.sum() == pytest.approx(1)
    with pytest.raises(ValueError, match="read-only"):
        x[0] = 2.0


def test_properties_of_other_fractions(r454b):
    vapour = r454b.saturation(temperature=280.0).bubble.vapour
    p = r454b.properties(temperature=280.0, molar_density=vapour.molar_density, mole_fractions=vapour.mole_fractions)
    assert p.pressure == pytest.approx(r454b.saturation(temperature=280.0).bubble.pressure, rel=1e-8)
    assert p.isobaric_heat_capacity > p.isochoric_heat_capacity > 0
    assert 100 < p.speed_of_sound < 300


def test_range_and_top(r134a, r454b):
    assert r134a.top.is_critical_point
    assert r134a.top.temperature == pytest.approx(374.2, abs=0.1)
    assert r134a.top.pressure == pytest.approx(4.06e6, rel=2e-3)
    assert r134a.glide(pressure=5e5) == 0
    assert r134a.range.lowest_set_by == "R-134a"
    assert r454b.range.lowest_temperature < 250 < r454b.range.highest_temperature
    assert 345 < r454b.top.temperature < 360


def test_reference_states(catalogue):
    iir, ashrae = (zeotrope.refrigerant("R-134a", catalogue=catalogue, reference=k) for k in ("iir", "ashrae"))
    for r, T, h in ((iir, 273.15, 200e3), (ashrae, 233.15, 0.0)):
        liquid = r.saturation(temperature=T).bubble.liquid
        assert r.properties(temperature=T, molar_density=liquid.molar_density).enthalpy == pytest.approx(h, abs=1e-3)
    with pytest.raises(zeotrope.BadInput, match="reference"):
        zeotrope.refrigerant("R-134a", catalogue=catalogue, reference="mine")  # type: ignore[arg-type]


def test_reprs_say_something(r134a, r454b, catalogue):
    s = r454b.saturation(temperature=280.0)
    objects = [r134a, r454b, s, s.bubble, s.bubble.liquid, r454b.top, r454b.range, r454b.components[0], r454b.pairs[0], catalogue]
    objects.append(r134a.properties(temperature=300.0, molar_density=10.0))
    for o in objects:
        assert repr(o).startswith("<zeotrope.")
        assert any(c.isdigit() for c in repr(o)) or "fluids" in repr(o)
    assert repr(r454b) == "<zeotrope.Refrigerant R-454B: R-32 68.9 + R-1234yf 31.1 % by mass>"


# ---- errors


def test_error_classes():
    kinds = {"BadInput": ValueError, "OutOfRange": ValueError, "NoSolution": ValueError, "NotConverged": RuntimeError, "BadFile": ValueError}
    for kind, also in kinds.items():
        assert issubclass(getattr(zeotrope, kind), zeotrope.Error)
        assert issubclass(getattr(zeotrope, kind), also)


def test_errors_of_names_and_recipes(catalogue):
    with pytest.raises(zeotrope.BadInput, match="R-454B"):
        zeotrope.refrigerant("R-454Q", catalogue=catalogue)
    with pytest.raises(zeotrope.BadInput, match="add to 0.9"):
        zeotrope.blend({"R-32": 0.5, "R-125": 0.4}, catalogue=catalogue)
    with pytest.raises(zeotrope.BadInput, match="twice"):
        zeotrope.blend({"R-32": 0.5, "r32": 0.5}, catalogue=catalogue)
    with pytest.raises(zeotrope.BadInput, match="no components"):
        zeotrope.blend({}, catalogue=catalogue)
    with pytest.raises(zeotrope.BadInput, match="basis"):
        zeotrope.blend(R454B, basis="volume", catalogue=catalogue)  # type: ignore[arg-type]
    with pytest.raises(TypeError):
        zeotrope.refrigerant(134, catalogue=catalogue)  # type: ignore[arg-type]


def test_message_cut_within_a_character(catalogue):
    with pytest.raises(zeotrope.BadInput, match="no refrigerant"):
        zeotrope.refrigerant("x" + "é" * 60, catalogue=catalogue)


def test_errors_of_states(r134a):
    for arguments in ({}, {"temperature": 280.0, "pressure": 1e5}, {"temperature": -1.0}, {"pressure": math.nan}):
        with pytest.raises(zeotrope.BadInput):
            r134a.saturation(**arguments)
    with pytest.raises(zeotrope.NoSolution, match="R-134a"):
        r134a.saturation(temperature=400.0)
    with pytest.raises(zeotrope.OutOfRange, match="published range"):
        r134a.saturation(temperature=165.0)
    assert r134a.saturation(temperature=165.0, extrapolate=True).bubble.extrapolated
    with pytest.raises(zeotrope.BadInput, match="molar density"):
        r134a.properties(temperature=300.0, molar_density=0.0)
    with pytest.raises(TypeError):
        r134a.saturation(280.0)


def test_bad_file(tmp_path):
    (tmp_path / "blends.toml").write_text("[[blend]]\ndesignation = 12\n")
    with pytest.raises(zeotrope.BadFile) as caught:
        zeotrope.refrigerant("R-454B", fluids=[tmp_path])
    e = caught.value
    assert Path(e.file) == tmp_path / "blends.toml"
    assert e.line in (1, 2)
    assert "designation" in e.key + str(e)
    again = pickle.loads(pickle.dumps(e))
    assert (str(again), again.file, again.line, again.key) == (str(e), e.file, e.line, e.key)


# ---- folders


def test_folder_of_the_caller_comes_first(tmp_path, catalogue):
    shipped = next(f for f in catalogue.folders if (f / "compounds").is_dir())
    text = (shipped / "compounds" / "R-32.toml").read_text()
    (tmp_path / "compounds").mkdir()
    (tmp_path / "compounds" / "R-32.toml").write_text(text.replace('chemical_name = "', 'chemical_name = "my '))
    mine = zeotrope.refrigerant("R-32", fluids=[tmp_path])
    assert mine.components[0].chemical_name.startswith("my ")
    assert not zeotrope.refrigerant("R-32").components[0].chemical_name.startswith("my ")
    # what the folder lacks comes from the packaged one
    assert zeotrope.refrigerant("R-454B", fluids=[str(tmp_path)]).components[0].chemical_name.startswith("my ")


def test_folder_of_the_environment(tmp_path, monkeypatch, catalogue):
    shipped = next(f for f in catalogue.folders if (f / "compounds").is_dir())
    text = (shipped / "compounds" / "R-32.toml").read_text()
    (tmp_path / "compounds").mkdir()
    (tmp_path / "compounds" / "R-32.toml").write_text(text.replace('chemical_name = "', 'chemical_name = "my '))
    monkeypatch.setenv("ZEOTROPE_FLUIDS", str(tmp_path))
    assert zeotrope.refrigerant("R-32").components[0].chemical_name.startswith("my ")
    monkeypatch.setenv("ZEOTROPE_FLUIDS", str(tmp_path / "nowhere"))
    with pytest.raises(zeotrope.BadInput, match="ZEOTROPE_FLUIDS"):
        zeotrope.refrigerant("R-32")


def test_folder_faults(tmp_path, catalogue):
    with pytest.raises(zeotrope.BadInput, match="no such folder"):
        zeotrope.Catalogue([tmp_path / "nowhere"])
    with pytest.raises(zeotrope.BadInput, match="list of folders"):
        zeotrope.Catalogue(str(tmp_path))
    with pytest.raises(zeotrope.BadInput, match="at most one"):
        zeotrope.refrigerant("R-32", fluids=[tmp_path], catalogue=catalogue)


def test_catalogue_lists(catalogue):
    assert {"R-32", "R-1234ze(E)", "R-744"} <= set(catalogue.compounds())
    assert "R-454B" in catalogue.blends()


# ---- charts


def test_chart_by_temperature(r454b, catalogue):
    table = zeotrope.pt_chart(r454b, from_=-20, to=20, step=10, pressure_unit=["bar(g)", "psig"], catalogue=catalogue)
    assert isinstance(table, pd.DataFrame)
    assert list(table.columns) == [
        "temperature [degC]",
        "bubble pressure [bar(g)]",
        "bubble pressure [psig]",
        "dew pressure [bar(g)]",
        "dew pressure [psig]",
        "glide [K]",
        "extrapolated",
        "note",
    ]
    assert list(table["temperature [degC]"]) == [-20, -10, 0, 10, 20]
    assert table["extrapolated"].dtype == bool
    s = r454b.saturation(temperature=273.15)
    row = table.iloc[2]
    assert row["bubble pressure [bar(g)]"] == pytest.approx((s.bubble.pressure - 101325) / 1e5, rel=1e-9)
    assert row["dew pressure [psig]"] == pytest.approx((s.dew.pressure - 101325) / 6894.757293168361, rel=1e-9)
    assert row["glide [K]"] == pytest.approx(r454b.glide(pressure=s.bubble.pressure), abs=1e-6)
    assert (table["note"] == "").all()


def test_chart_by_pressure_in_fahrenheit(r454b, catalogue):
    table = zeotrope.pt_chart(r454b, from_=100, to=140, step=20, by="pressure", temperature_unit="F", pressure_unit=["psig", "kPa(a)"], catalogue=catalogue)
    assert list(table.columns)[:5] == ["pressure [psig]", "pressure [kPa(a)]", "bubble temperature [degF]", "dew temperature [degF]", "glide [degF]"]
    assert list(table["pressure [psig]"]) == [100, 120, 140]
    assert table["pressure [kPa(a)]"].to_numpy() == pytest.approx((table["pressure [psig]"] * 6.894757293168361 + 101.325).to_numpy())
    difference = table["dew temperature [degF]"] - table["bubble temperature [degF]"]
    assert table["glide [degF]"].to_numpy() == pytest.approx(difference.to_numpy(), abs=1e-9)


def test_blank_rows_say_why(catalogue):
    table = zeotrope.pt_chart("R-134a", from_=-120, to=120, step=20, catalogue=catalogue)
    column = "bubble pressure [bar(g)]"
    assert np.isnan(table[column].iloc[0])
    assert "published range" in table["note"].iloc[0]
    assert np.isnan(table[column].iloc[-1])
    assert "critical" in table["note"].iloc[-1]
    assert (table[column].isna() == (table["note"] != "")).all()
    further = zeotrope.pt_chart("R-134a", from_=-110, to=-90, step=10, extrapolate=True, catalogue=catalogue)
    assert list(further["extrapolated"]) == [True, False, False]
    assert list(further["note"]) == ["extrapolated", "", ""]
    assert further[column].notna().all()


def test_attrs(catalogue):
    attrs = zeotrope.pt_chart("R-454B", catalogue=catalogue).attrs
    assert attrs["name"] == "R-454B"
    assert attrs["designated"]
    assert [c["designation"] for c in attrs["composition"]] == ["R-32", "R-1234yf"]
    assert attrs["composition"][0]["mass_percent"] == pytest.approx(68.9)
    assert attrs["safety_group"] == "A2L"
    assert set(attrs["gwp"]) == {"IPCC AR4", "IPCC AR5", "IPCC AR6", "Regulation (EU) 2024/573"}
    assert all(v is None or v > 0 for v in attrs["gwp"].values())
    assert all(s["equation"] and s["source"] for s in attrs["sources"])
    assert attrs["pairs"][0]["kind"]
    assert attrs["cautions"] and attrs["cautions"][0]["text"]
    assert any("101.325 kPa" in n for n in attrs["notes"])
    json.dumps(attrs)  # plain types only


def test_attrs_of_a_new_blend(catalogue):
    r = zeotrope.blend({"R-32": 0.5, "R-1233zd(E)": 0.5}, catalogue=catalogue)
    attrs = zeotrope.pt_chart(r, catalogue=catalogue).attrs
    assert not attrs["designated"]
    estimated = [p for p in attrs["pairs"] if p["kind"].startswith("estimated")]
    assert attrs["estimated_pairs"] == [f"{p['first']} / {p['second']}" for p in estimated]
    assert attrs["estimated_pairs"] == [f"{p.first} / {p.second}" for p in r.pairs if p.estimated]
    assert attrs["estimated_pairs"]
    assert any("new blend" in n for n in attrs["notes"])


def test_altitude_and_barometer(r134a, catalogue):
    arguments = {"from_": 0, "to": 0, "step": 1, "catalogue": catalogue}
    sea = zeotrope.pt_chart(r134a, **arguments)
    high = zeotrope.pt_chart(r134a, altitude=1500, **arguments)
    low = zeotrope.pt_chart(r134a, barometer=95e3, **arguments)
    column = "bubble pressure [bar(g)]"
    air = zeotrope.units.atmosphere_at_altitude(1500)
    assert high[column][0] - sea[column][0] == pytest.approx((101325 - air) / 1e5)
    assert low[column][0] - sea[column][0] == pytest.approx(0.06325)
    assert high.attrs["ambient"] == air
    assert any("1500 m" in n for n in high.attrs["notes"])
    assert any("95.000 kPa" in n for n in low.attrs["notes"])
    with pytest.raises(zeotrope.BadInput, match="at most one"):
        zeotrope.pt_chart(r134a, altitude=0, barometer=1e5, **arguments)


@pytest.mark.parametrize(
    "options",
    [
        {"step": 0},
        {"from_": 10, "to": 0},
        {"from_": 0, "to": 1e6, "step": 1},
        {"by": "volume"},
        {"pressure_unit": "bar"},
        {"pressure_unit": []},
        {"temperature_unit": "R"},
        {"altitude": 20000},
        {"barometer": -1},
    ],
)
def test_chart_faults(r134a, catalogue, options):
    with pytest.raises(zeotrope.BadInput):
        zeotrope.pt_chart(r134a, catalogue=catalogue, **options)


def test_unknown_option(r134a, catalogue):
    with pytest.raises(TypeError, match="start"):
        zeotrope.pt_chart(r134a, start=0, catalogue=catalogue)  # type: ignore[call-arg]


def test_rendered_charts(r454b, catalogue):
    text = zeotrope.chart_text(r454b, from_=-20, to=20, catalogue=catalogue)
    card = zeotrope.chart_card(r454b, from_=-20, to=20, catalogue=catalogue)
    assert "R-454B" in text
    assert "R-454B" in card
    assert "<html" in card.lower()


# ---- units


def test_units():
    u = zeotrope.units
    assert u.to_pascal(0, "psig") == u.standard_atmosphere == 101325
    assert u.from_pascal(u.to_pascal(118, "psig", ambient=84e3), "psig", ambient=84e3) == pytest.approx(118)
    assert u.to_kelvin(-40, "F") == pytest.approx(233.15)
    assert u.from_kelvin(233.15, "C") == pytest.approx(-40)
    assert u.parse_pressure("2.5 bar(a)") == pytest.approx(2.5e5)
    assert u.parse_temperature("-40 F") == pytest.approx(233.15)
    with pytest.raises(zeotrope.BadInput):
        u.parse_pressure("100 psi")


# ---- threads


def test_threads_share_a_refrigerant(catalogue):
    temperatures = [230.0 + 2 * k for k in range(40)]
    alone = zeotrope.refrigerant("R-454B", catalogue=catalogue)
    wanted = [alone.saturation(temperature=T).bubble.pressure for T in temperatures]
    shared = zeotrope.refrigerant("R-454B", catalogue=catalogue)  # its lines are traced by whichever thread comes first
    with ThreadPoolExecutor(4) as pool:
        found = list(pool.map(lambda T: shared.saturation(temperature=T).bubble.pressure, temperatures))
        tables = list(pool.map(lambda name: zeotrope.pt_chart(name, catalogue=catalogue), ["R-32", "R-410A", "R-407C", "R-290"]))
    assert found == wanted
    assert [t.attrs["name"] for t in tables] == ["R-32", "R-410A", "R-407C", "R-290"]
