"""How far placed parts reach."""

from fabgen.design.arranged import Box, Placed, Vector


def extent(part: Placed) -> Box:
    """The smallest box round a part's simple shapes, in the array's frame."""
    boxes = [shape if isinstance(shape, Box) else shape.box for shape in part.shapes]
    low = tuple(min(box.low[axis] for box in boxes) for axis in range(3))
    high = tuple(max(box.high[axis] for box in boxes) for axis in range(3))
    return Box((low[0], low[1], low[2]), (high[0], high[1], high[2]))


def local_extent_mm(part: Placed) -> Vector:
    """Size of a part along its own x, y and z axes."""
    box = extent(part)
    size = [high - low for low, high in zip(box.low, box.high, strict=True)]
    x, y, z = (
        sum(abs(part_of_axis) * mm for part_of_axis, mm in zip(axis, size, strict=True))
        for axis in (part.frame.x, part.frame.y, part.frame.z)
    )
    return (x, y, z)
