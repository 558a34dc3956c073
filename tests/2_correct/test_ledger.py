"""From modelled to cut: columns add up as printed, origins and uncertainties are what they say."""

import csv
import io
import math
from collections.abc import Callable
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen import pipeline
from fabgen.correct.ledger import correct
from fabgen.design.design import Design
from fabgen.design.ledger import Allowance, Ledger, LedgerLine, Remark
from fabgen.export.tables import lengths_csv
from fabgen.physics import published_boom
from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.read.reader import read_design

Variant = Callable[..., Design]
COMPUTED = "allowance: {origin: computed}"
BUSHED = (
    "style: insulated-through\n    hole: 8 mm\n    bush: {kind: shoulder, material: ASA}\n"
    "    keeper: {kind: push-ring, material: ASA}\n    allowance: {origin: computed}"
)


def line(design: Design, element: str) -> LedgerLine:
    return correct(design).line(element)


def printed(ledger: Ledger) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(lengths_csv(ledger).decode("utf-8"))))


@pytest.mark.parametrize(
    "replacements",
    [
        (),
        (("length: 311.3", "length: 12 1/64 in"),),
        (("cut_step: 0.5 mm", "cut_step: 1/64 in"),),
        (("cut_step: 0.5 mm", "cut_step: 0.7 mm"), (COMPUTED, "allowance: {origin: published, model: dl6wu}")),
    ],
)
def test_the_printed_columns_add_up(variant: Variant, replacements: tuple[tuple[str, str], ...]) -> None:
    for row in printed(correct(variant(*replacements))):
        micrometres = {k: round(1000 * float(v)) for k, v in row.items() if k.endswith("_mm")}
        total = sum(micrometres[k] for k in ("modelled_mm", "allowance_mm", "rod_change_mm", "rounding_mm"))
        assert total == micrometres["cut_mm"], row


def test_a_cut_is_a_whole_number_of_the_shops_steps_and_the_nearest_one(variant: Variant) -> None:
    for found in correct(variant()).lines:
        if found.role != "driven":
            assert found.cut_mm / 0.5 == pytest.approx(round(found.cut_mm / 0.5), abs=1e-9)
        assert abs(found.rounding_mm) <= 0.25 + 1e-9


@pytest.mark.parametrize(("length_mm", "cut_mm"), [(311.25, 311.5), (311.75, 312.0), (311.249, 311.0), (311.0, 311.0)])
def test_of_two_steps_equally_near_the_longer_is_cut(variant: Variant, length_mm: float, cut_mm: float) -> None:
    as_cut = variant(("length: 311.3", f"length: {length_mm}"), ("lengths_are: free-space", "lengths_are: as-cut"))
    assert line(as_cut, "D1").cut_mm == cut_mm


def test_each_half_of_a_split_dipole_is_a_whole_step(variant: Variant) -> None:
    found = line(variant(("cut_step: 0.5 mm", "cut_step: 1 mm")), "DE")
    assert (found.cut_mm - 10.0) / 2 == pytest.approx(160.0)  # (329.2 - 10) / 2 = 159.6
    assert found.rounding_mm == pytest.approx(0.8)


def test_a_published_value_carries_the_spread_of_all_printed_ones(variant: Variant) -> None:
    """Bonded through a 20 mm round boom at 432.2 MHz: 10.721 by DL6WU's curve, 14.0 and 15.0 by the two rules in D.

    Source: reference sheet of published models, computed from the closed form; tolerance 0.001 mm.
    """
    design = variant(
        (BUSHED, "style: bonded-through\n    bond: weld\n    allowance: {origin: published, model: dl6wu}"),
        ("section: square", "section: round"),
        ("  corner_radius: 1 mm\n", ""),
        ("frequency: 434 MHz", "frequency: 432.2 MHz"),
    )
    found = line(design, "D1").allowance
    assert found.value_mm == pytest.approx(10.721, abs=1e-3)
    assert found.origin == "published"
    values = {value.model: value.value_mm for value in found.published}
    assert values == pytest.approx({"dl6wu": 10.721, "lawson": 14.0, "fishenden-wiblin": 15.0}, abs=1e-3)
    assert found.u_mm == pytest.approx((15.0 - 10.721) / math.sqrt(12), abs=1e-3)
    assert found.correlated_u_mm == found.u_mm


def test_a_square_boom_may_be_read_as_los_equivalent(variant: Variant) -> None:
    side = variant((COMPUTED, "allowance: {origin: published, model: dl6wu}"))
    lo = variant((COMPUTED, "allowance: {origin: published, model: dl6wu, square_as: lo}"))
    for design, boom_mm in ((side, 20.0), (lo, 20.0 * published_boom.LO_SQUARE)):
        half_mm = published_boom.dl6wu_fraction(boom_mm / design.wavelength_mm) * boom_mm / 2
        assert line(design, "D1").allowance.value_mm == pytest.approx(half_mm)
    assert [remark.code for remark in line(side, "D1").allowance.remarks] == ["L03"]


def test_a_model_without_a_rule_for_the_mount_gives_no_number(variant: Variant) -> None:
    found = line(variant((COMPUTED, "allowance: {origin: published, model: lawson}")), "D1").allowance
    assert found.missing
    assert (found.value_mm, found.origin) == (0.0, "none")
    assert found.remarks[0].code == "L01"


def test_beyond_its_range_a_published_curve_is_remarked(variant: Variant) -> None:
    design = variant(
        (COMPUTED, "allowance: {origin: published, model: dl6wu}"),
        ("outside: 20 mm", "outside: 40 mm"),
        ("kind: straight-dipole, gap: 10 mm, height: 18 mm", "kind: straight-dipole, gap: 10 mm, height: 22 mm"),
    )
    remark = next(r for r in line(design, "D1").allowance.remarks if r.code == "L02")
    assert remark.measured == pytest.approx(40.0 / design.wavelength_mm)
    assert remark.required == 0.055


def l02(design: Design) -> Remark:
    (found,) = (remark for remark in line(design, "D1").allowance.remarks if remark.code == "L02")
    return found


def test_a_limit_in_print_is_named_with_the_size_it_is_held_against(variant: Variant) -> None:
    """Each model by its own limit; a square boom read as Lo's equivalent by that; 0.06 D ends with contact, no size."""
    published = "allowance: {origin: published, model: %s}"
    lo = variant(("{origin: computed}", "{origin: published, square_as: lo}"), ("outside: 20 mm", "outside: 35 mm"))
    assert l02(lo).measured == pytest.approx(35.0 * published_boom.LO_SQUARE / lo.wavelength_mm)
    assert l02(lo).required == 0.055
    bonded = "style: bonded-through\n    bond: weld\n    " + published % "fishenden-wiblin"
    wide = variant((BUSHED, bonded), ("outside: 20 mm", "outside: 36 mm"))
    assert l02(wide).measured == pytest.approx(36.0 / wide.wavelength_mm)
    assert l02(wide).required == 0.05
    saddle = "style: on-top\n    saddle: {height: 6 mm, screw: M3, material: ASA}\n    " + published % "lawson"
    raised = variant((BUSHED, saddle))
    assert "rod touches the boom" in l02(raised).text
    assert l02(raised).measured is l02(raised).required is None


@pytest.mark.parametrize("choice", ["{origin: published, model: lawson}", "{origin: computed}"])
@pytest.mark.parametrize(("section", "said"), [("square", "0.28 to 0.55"), ("round", "0.19 to 0.33")])
def test_of_a_rod_that_touches_print_and_theory_are_both_told(
    variant: Variant, choice: str, section: str, said: str
) -> None:
    """Ratios: own study 2026, computed, unpublished."""
    touching = f"style: on-top\n    saddle: {{height: 2 mm, screw: M3, material: ASA}}\n    allowance: {choice}"
    corner = () if section == "square" else (("  corner_radius: 1 mm\n", ""),)
    design = variant((BUSHED, touching), ("section: square", f"section: {section}"), *corner)
    (told,) = (r.text for r in line(design, "D1").allowance.remarks if "0.06" in r.text)
    assert said in told
    assert "fabgen coupon" in told


@pytest.mark.parametrize("finish", ["anodised", "painted"])
def test_a_film_in_a_tight_hole_gives_no_number(variant: Variant, finish: str) -> None:
    """A press fit parts an anodised or painted rod from the boom: nobody solved or printed that. A weld does not."""
    film = ("finish: bare", f"finish: {finish}")
    for choice, code in (("{origin: computed}", "L04"), ("auto", "L04"), ("{origin: published, model: lawson}", "L01")):
        pressed = f"style: bonded-through\n    bond: press\n    allowance: {choice}"
        found = line(variant((BUSHED, pressed), film), "D1").allowance
        assert (found.missing, found.value_mm, found.origin, found.published) == (True, 0.0, "none", ())
        assert code in {remark.code for remark in found.remarks}
        assert any("bush it" in remark.text for remark in found.remarks)
        for bare in (variant((BUSHED, pressed)), variant((BUSHED, pressed.replace("press", "weld")), film)):
            assert line(bare, "D1").allowance.value_mm > 0


def test_a_computed_value_depends_on_the_rods_own_length(variant: Variant) -> None:
    ledger = correct(variant())
    assert ledger.line("R").allowance.value_mm > ledger.line("D1").allowance.value_mm
    assert ledger.line("D1").allowance.value_mm > ledger.line("D7").allowance.value_mm
    assert "theory, unmeasured" in ledger.line("D1").allowance.source


@pytest.mark.parametrize(("material", "permittivity"), [("ASA", 2.7), ("PTFE", 2.05)])
def test_the_bush_enters_with_its_own_permittivity_and_length(
    variant: Variant, material: str, permittivity: float
) -> None:
    """Dielectric values: Riddle, Baker-Jarvis, Krupka, IEEE Trans. MTT 51 (2003) 727, secondary source."""
    design = variant(("kind: shoulder, material: ASA", f"kind: shoulder, material: {material}"))
    mount = BoomMount(
        Style.INSULATED_THROUGH,
        Section.SQUARE,
        20.0,
        4.0,
        wall_mm=1.5,
        hole_mm=8.0,
        bush_permittivity=permittivity,
        bush_length_mm=2.5,
    )
    expected = closed_form_allowance(mount, 311.3, 434.0)
    assert expected.bush_term_mm < -0.01
    assert line(design, "D1").allowance.value_mm == pytest.approx(expected.allowance_mm, rel=1e-9)


def test_only_interior_rods_share_a_part_of_u_and_each_end_counts_from_its_own_side(variant: Variant) -> None:
    """3 % of a boom of 0.029 wavelengths; 60 mm is 3 sides: 15 % at either end (own study 2026, unpublished)."""
    ledger = correct(variant())
    shares = {
        row.element: row.allowance.correlated_u_mm / row.allowance.value_mm
        for row in ledger.lines
        if row.allowance.needed
    }
    assert shares.pop("R") == shares.pop("D10") == 0.0
    assert list(shares.values()) == pytest.approx([0.03] * 9)
    for end, other in (("R", "D1"), ("D10", "D9")):
        far, near = ledger.line(other).allowance, ledger.line(end).allowance
        assert near.u_mm / near.value_mm > 0.149 > far.u_mm / far.value_mm


def test_outside_the_computed_range_there_is_no_number_but_reasons(variant: Variant) -> None:
    design = variant(("overhang: {rear: 60 mm", "overhang: {rear: 25 mm"), ("clamp: {at: balance, mast: 38 mm}\n", ""))
    found = line(design, "R").allowance
    assert found.missing
    assert any("boom's end" in remark.text for remark in found.remarks if remark.code == "L04")


def test_a_stated_value_is_taken_as_it_is(variant: Variant) -> None:
    stated = "allowance: {origin: stated, value: 4.6 mm, uncertainty: 0.4 mm, source: our own coupon}"
    found = line(variant((COMPUTED, stated)), "D1")
    assert (found.allowance.value_mm, found.allowance.u_mm, found.allowance.origin) == (4.6, 0.4, "stated")
    assert "our own coupon" in found.allowance.source
    assert found.allowance.correlated_u_mm == 0.4  # one figure for all rods: what it is off, it is off for all
    assert found.trim_mm == 1.0


def test_lengths_as_cut_get_nothing(variant: Variant) -> None:
    ledger = correct(variant(("lengths_are: free-space", "lengths_are: as-cut")))
    assert {found.allowance.value_mm for found in ledger.lines} == {0.0}
    assert ledger.status == "allowances: none needed"


def test_a_driven_rod_gets_a_trim_margin_and_no_allowance(variant: Variant) -> None:
    found = line(variant(), "DE")
    assert (found.allowance.value_mm, found.allowance.origin) == (0.0, "none")
    assert found.trim_mm == 7.0  # 2 % of 329.2 mm, up to the next half millimetre


def test_a_driven_rods_allowance_may_be_stated(variant: Variant) -> None:
    stated = "cable: 5 mm, allowance: {origin: stated, value: -2 mm, uncertainty: 1 mm, source: last build}}"
    found = line(variant(("cable: 5 mm}", stated)), "DE").allowance
    assert (found.value_mm, found.u_mm, found.correlated_u_mm) == (-2.0, 1.0, 0.0)


def test_a_wooden_boom_takes_nothing(variant: Variant) -> None:
    ledger = correct(variant(base="sonde-finder-401.yaml"))
    assert all(found.allowance.value_mm == 0 and found.allowance.u_mm == 0 for found in ledger.lines)
    assert ledger.status == "allowances: none needed"


def test_u_in_khz_is_that_of_a_half_wave_rod(variant: Variant) -> None:
    found = line(variant(), "D1")
    assert found.shift_khz == pytest.approx(434e3 * found.allowance.u_mm / 311.3, rel=1e-9)


def test_u_combines_in_quadrature_with_the_tolerance_as_a_rectangle(variant: Variant) -> None:
    found = line(variant(), "D1")
    expected = math.sqrt(found.allowance.u_mm**2 + (0.5 / math.sqrt(3)) ** 2)
    assert found.u_mm == pytest.approx(expected)


def test_the_status_names_the_weakest_origin() -> None:
    def ledger(*origins: str) -> Ledger:
        lines = [
            LedgerLine(
                element=f"D{k}",
                role="director",
                station_mm=0,
                rod_mm=4,
                modelled_mm=300,
                rod_change_mm=0,
                allowance=Allowance(1.0, origin),
                rod_change_u_mm=0,
                rounding_mm=0,
                cut_mm=301,
                tolerance_mm=0.5,
                trim_mm=0,
                shift_khz=0,
            )
            for k, origin in enumerate(origins)
        ]
        return Ledger(tuple(lines))

    assert ledger("measured", "computed").status == "allowances: computed"
    assert ledger("computed", "published").status == "allowances: published"
    assert ledger("published", "stated", "measured").status == "allowances: stated"
    assert ledger("none", "stated").status == "allowances: none"


@given(step=st.sampled_from([0.1, 0.25, 0.5, 1.0, 25.4 / 64]), length=st.floats(250.0, 400.0))
def test_rounding_never_moves_a_length_by_more_than_half_a_step(step: float, length: float) -> None:
    from fractions import Fraction

    from fabgen.correct.ledger import _nearest_step_um

    cut = _nearest_step_um(round(Fraction(length) * 1000), step)
    assert abs(cut - 1000 * length) <= 500 * step + 1


def test_a_clamp_beside_a_rod_makes_its_length_less_certain(root: Path) -> None:
    """The river gauge's clamp stands 11 mm from D5: a tenth of its allowance joins the others in quadrature."""
    ledger = pipeline.check(root / "designs" / "river-gauge-434.yaml").arranged.ledger
    design = read_design(root / "designs" / "river-gauge-434.yaml").design
    alone, beside = correct(design).line("D5").allowance, ledger.line("D5").allowance
    assert beside.value_mm == alone.value_mm
    assert beside.u_mm == pytest.approx(math.hypot(alone.u_mm, 0.1 * alone.value_mm), rel=1e-3)
    assert ledger.line("D8").allowance.u_mm == correct(design).line("D8").allowance.u_mm
