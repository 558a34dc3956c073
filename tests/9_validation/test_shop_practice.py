"""Hole distances, printing practice, drilling."""

import pytest

from fabgen.stock.tables import (
    UnknownStockError,
    edge_distance_factor,
    print_practice,
    process_range,
)


def test_distances_between_holes_and_edges():
    """EN 1993-1-8 Table 3.3, secondary source: 1.2 d0 to end and edge, slots 1.5, pitch 2.2 along and 2.4 across.

    Two diameters are preferred (common practice); EN 1999-1-1 from memory.
    """
    assert edge_distance_factor("end") == edge_distance_factor("edge") == 1.2
    assert edge_distance_factor("slotted") == 1.5
    assert edge_distance_factor("pitch along") == 2.2
    assert edge_distance_factor("pitch across") == 2.4
    assert edge_distance_factor("end", "preferred") == edge_distance_factor("edge", "preferred") == 2
    assert edge_distance_factor("end", "aluminium normal") == 2
    assert edge_distance_factor("edge", "aluminium normal") == 1.5
    assert 6.6 * edge_distance_factor("end") == pytest.approx(7.92)
    assert 6.6 * edge_distance_factor("end", "preferred") == pytest.approx(13.2)
    with pytest.raises(UnknownStockError, match="preferred slotted"):
        edge_distance_factor("slotted", "preferred")


@pytest.mark.parametrize(
    ("quantity", "value"),
    [
        ("lines_in_thinnest_wall", 2),
        ("recommended_wall_mm", 1.2),
        ("structural_wall_mm", 2.4),
        ("overhang_from_vertical_deg", 45),
        ("longest_bridge_mm", 20),
        ("diametral_undersize_press_mm", 0.1),
        ("diametral_undersize_slip_mm", 0.2),
        ("bush_bore_clearance_mm", 0.2),
        ("spigot_clearance_mm", 0.2),
        ("saddle_bore_clearance_mm", 0.3),
        ("split_keeper_grip_mm", 0.3),
        ("thinnest_spigot_wall_mm", 1.2),
        ("spigot_beyond_wall_mm", 1),
        ("flange_beyond_hole_mm", 4),
        ("keeper_play_mm", 0.3),
        ("largest_keeper_strain_percent", 2),
    ],
)
def test_printing_practice(quantity, value):
    """Common practice: wall, overhang, bridge and undersize from secondary sources; fits from memory."""
    assert print_practice(quantity) == value


def test_drilling():
    """Common practice, from memory: pilot 2 to 2.5 mm, a step drill or reamer above 6 mm."""
    assert process_range("pilot_drill_mm") == (2.0, 2.5)
    assert process_range("step_drill_above_mm") == (6.0, 6.0)


def test_unknown_practice_is_refused():
    with pytest.raises(UnknownStockError, match="longest_bridge_mm"):
        print_practice("longest_bridge")
    with pytest.raises(UnknownStockError, match="pilot_drill_mm"):
        process_range("pilot_drill")
