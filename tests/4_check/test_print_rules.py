"""P: walls, bed, overhangs and bores of printed parts."""

from fabgen.check.printed import distinct_prints, overhangs


def test_walls_under_two_lines(found):
    """The feed block's rim of 1.2 mm is the thinnest wall of all.

    A spigot of 5.7 round a bore of 4.2, drawn 0.2 larger, leaves 0.65. A folded dipole's saddle has 1.2 mm between the
    slot of its upper limb and the retainer's hole, both drawn 0.2 larger: 1.0.
    """
    assert found("printed_walls", {"printer.nozzle": 0.6}) == []
    coarse = found("printed_walls", {"printer.nozzle": 0.65})
    assert ("P01", "fail", "DE", 1.2, 1.3) in coarse
    folded = {"feed": {"kind": "folded-dipole", "spacing": 30, "gap": 10, "height": 18, "cable": 5}}
    assert found("printed_walls", folded | {"printer.nozzle": 0.5}) == []
    assert ("P01", "fail", "DE", 1.0, 1.1) in found("printed_walls", folded | {"printer.nozzle": 0.55})
    thin = {"mounts.line.hole": 6.0, "mounts.line.bush.spigot": 5.7}
    assert found("printed_walls", thin) == [("P01", "fail", "R, D1, D2", 0.65, 0.8)]


def test_walls_between_the_openings_of_the_feeds(found):
    """A gap of 1 mm is a rib of 1 mm, a thin cable has a thin wedge, and wide growth eats the walls at the lid screws.

    Round a lid screw M3 stand 7 − 4.4 − 2.5/2 = 1.35 mm of its post, less half the growth: 1 mm at 0.7.
    """

    def walls(changes):
        return [each for each in found("printed_walls", changes) if each[2] == "DE"]

    for kind in ({"kind": "straight-dipole"}, {"kind": "folded-dipole", "spacing": 30}):
        narrow = {"feed": kind | {"gap": 1.0, "height": 18, "cable": 5}, "printer.hole_growth": 0}
        assert walls(narrow | {"printer.nozzle": 0.5}) == []
        assert walls(narrow | {"printer.nozzle": 0.55}) == [("P01", "fail", "DE", 1.0, 1.1)]
    assert walls({"feed.cable": 1.0, "printer.nozzle": 0.55}) == [("P01", "fail", "DE", 1.0, 1.1)]
    assert walls({"printer.hole_growth": 0.7, "printer.nozzle": 0.5}) == []
    assert walls({"printer.hole_growth": 0.72, "printer.nozzle": 0.5}) == [("P01", "fail", "DE", 0.99, 1.0)]


def test_a_saddles_walls_are_judged_as_drawn(found, on_top):
    """On a narrow boom 1.2 mm is left at the apex of a counterbore, less √½ of the growth: 0.85 at 0.5."""
    narrow = {"mounts.line": on_top, "boom.outside": 10, "printer.hole_growth": 0.5}
    seen = [each for each in found("printed_walls", narrow | {"printer.nozzle": 0.45}) if each[2] != "DE"]
    ((code, severity, where, wall_mm, least_mm),) = seen
    assert (code, severity, where, least_mm) == ("P01", "fail", "R, D1, D2", 0.9)
    assert abs(wall_mm - (1.2 - 0.5 * 0.5**0.5)) < 1e-3


def test_parts_larger_than_the_bed(found, made):
    block = made().part("DE feed block").shapes[0]
    x_mm, y_mm = (round(block.high[i] - block.low[i], 3) for i in (0, 1))
    long = max(x_mm, y_mm)
    assert long > 41
    assert found("bed", {"printer.bed": [long, 40, 250]}) == []
    assert found("bed", {"printer.bed": [40, long, 250]}) == []
    assert found("bed", {"printer.bed": [40.5, 40, 250]}) == [("P02", "fail", "DE", long, 40.5)]


def test_a_saddle_lies_on_its_side(found, on_top):
    """As wide as the boom along the rod, so 60 mm tall on the bed."""
    wide = {"mounts.line": on_top, "boom.outside": 60, "feed.height": 18}
    ((code, severity, where, tall_mm, room_mm),) = [
        each for each in found("bed", wide | {"printer.bed": [220, 220, 50]}) if each[2] != "DE"
    ]
    assert (code, severity, where, tall_mm, room_mm) == ("P02", "fail", "R, D1, D2", 60, 50)


ROUND = {"boom.section": "round", "boom.corner_radius": None, "clamp": None}


def test_a_bridge_over_a_thick_round_boom(found, made):
    """The cradle's roof closes at 45° where there is room; under a low floor it is cut flat and must be bridged."""
    assert found("print_overhangs") == []
    assert found("print_overhangs", ROUND) == []
    thick = ROUND | {"boom.outside": 150}
    ((code, severity, where, span_mm, limit),) = found("print_overhangs", thick)
    assert (code, severity, where, limit) == ("P03", "warn", "DE", 20)
    size = next(size for part, size in distinct_prints(made(thick)) if part.part == "feed_block")
    assert span_mm == round(2 * ((2**0.5 - 1) * 75 - size.roof_mm), 3) > 20


def test_a_saddles_foot_stays_within_45_degrees(made, on_top):
    """0.7 of the boom's diameter: asin 0.7 = 44.43°."""
    arranged = made(ROUND | {"mounts.line": on_top, "boom.outside": 40})
    size = next(size for part, size in distinct_prints(arranged) if part.part == "saddle")
    (foot,) = overhangs(size)
    assert 44.4 < foot.slope_deg < 44.5


def test_a_bore_to_be_drilled_out(found, advice):
    """Without hole_growth a bore comes out some 0.2 mm too small: 4.0 where 4.2 is wanted."""
    assert found("printed_bores") == []
    assert found("printed_bores", {"printer.hole_growth": 0}) == [("P04", "warn", "R, D1, D2", 4, 4.2)]
    assert "4.2 mm" in advice("printed_bores", {"printer.hole_growth": 0})


def test_a_bore_too_small_to_print(found):
    """Five nozzles of 0.4 mm are 2 mm; a rod of 1.6 has a bore of 1.8."""
    thin = {"rods.diameter": 1.6, "elements.DE.diameter": 4}
    assert found("printed_bores", thin) == [("P04", "warn", "R, D1, D2", 1.8, 2)]
    assert found("printed_bores", thin | {"rods.diameter": 1.8}) == []
