"""The arranged design as an assembly and as prints: one product per distinct part, finished and printed bores."""

import types

import pytest

from fabgen.design.arranged import Frame, Placed
from fabgen.errors import ProgramError
from fabgen.model.assembly import assembly, unique
from fabgen.model.kernel import location_of
from fabgen.model.parts.push_ring import push_ring
from fabgen.model.prints import prints
from fabgen.model.solids import solid_of

LEFT = (0.0, 1.0, 0.0)


def placed(name, part, frame=None, *, source="made", metal=True, size=None, **parameters):
    frozen = tuple(sorted(parameters.items()))
    return Placed(name, "E", part, frozen, frame or Frame(), (), False, source, "x", metal, 1.0, size or part)


def arranged(*parts):
    """The placed parts alone: the model stage asks for nothing else."""
    return types.SimpleNamespace(placed=parts)


def sample():
    ring = {"source": "printed", "metal": False, "size": "keeper rod 4", "hole_growth_mm": 0.2}
    return arranged(
        placed("boom", "boom", size="boom 20 x 20"),
        placed("R", "rod", Frame((40, 0, 0), z=LEFT), size="rod 4 x 300", length_mm=300.0),
        placed("R keeper left", "push_ring", Frame((40, 13, 0), z=LEFT), **ring),
        placed("D1", "rod", Frame((90, 0, 0), z=LEFT), size="rod 4 x 280", length_mm=280.0),
        placed("D1 keeper left", "push_ring", Frame((90, 13, 0), z=LEFT), **ring),
        placed("washer", "washer", source="bought", size="washer M3"),
    )


def test_equal_parts_are_one_product():
    items = assembly(sample())
    assert [item.name for item in items] == ["boom", "R", "R keeper left", "D1", "D1 keeper left", "washer"]
    assert items[2].product is items[4].product
    assert items[1].product is not items[3].product
    assert items[4].frame.origin == (90, 13, 0)


def test_products_are_named_by_size_and_coloured_by_material():
    items = assembly(sample())
    assert [item.product.name for item in items[:4]] == ["boom 20 x 20", "rod 4 x 300", "keeper rod 4", "rod 4 x 280"]
    boom, rod, keeper, washer = (items[i].product.colour for i in (0, 1, 2, 5))
    assert len({boom, rod, keeper, washer}) == 4
    assert items[3].product.colour == rod


def test_assembled_bores_have_the_size_they_come_out_with_and_prints_the_size_that_is_drawn():
    model = sample()
    assembled = assembly(model)[2].product.solid
    (printed,) = prints(model)
    assert assembled.Volume() == pytest.approx(push_ring().val().Volume(), rel=1e-12)
    assert printed.product.solid.Volume() == pytest.approx(push_ring(hole_growth_mm=0.2).val().Volume(), rel=1e-9)
    assert printed.product.solid.Volume() < assembled.Volume()


def test_prints_are_counted_and_named_for_the_disk():
    (printed,) = prints(sample())
    assert (printed.stem, printed.quantity, printed.product.name) == ("keeper-rod-4", 2, "keeper rod 4")


def test_two_printed_parts_of_one_size_name_get_two_files():
    both = prints(
        arranged(
            *(
                placed(f"K{i}", "push_ring", source="printed", metal=False, size="Keeper / 4", length_mm=length)
                for i, length in enumerate((4.0, 5.0, 4.0))
            )
        )
    )
    assert [(each.stem, each.quantity) for each in both] == [("keeper-4", 2), ("keeper-4-2", 1)]


@pytest.mark.parametrize(
    ("names", "free"),
    [
        (["rod", "rod", "rod"], ["rod", "rod-2", "rod-3"]),
        (["rod-2", "rod", "rod"], ["rod-2", "rod", "rod-3"]),
        (["Rod", "rod"], ["Rod", "rod-2"]),
        (["Ø 4\n", ""], ["_ 4_", "part"]),
    ],
)
def test_names_are_unique_printable_ascii(names, free):
    taken = set()
    assert [unique(name, taken) for name in names] == free


def test_a_part_is_built_once():
    assert solid_of("rod", (("length_mm", 123.0),)) is solid_of("rod", (("length_mm", 123.0),))


def test_a_missing_part_is_named():
    with pytest.raises(ProgramError, match=r"has no gizmo\.py"):
        solid_of("gizmo")


@pytest.mark.parametrize(
    "frame",
    [Frame(), Frame((1, 2, 3), LEFT), Frame((0, 0, 5), (0, -1, 0), (1, 0, 0)), Frame((7, 0, 0), (1, 0, 0), (0, 0, 1))],
)
def test_the_kernel_places_like_the_frame(frame):
    import cadquery as cq

    for point in ((0.0, 0.0, 0.0), (3.0, -2.0, 11.0)):
        moved = cq.Vertex.makeVertex(*point).moved(location_of(frame)).Center().toTuple()
        assert moved == pytest.approx(frame.point(point), abs=1e-12)
