"""From where to where shapes and parts reach along an axis: what most rules ask, at the price of two sums."""

from fabgen.design.arranged import Box, Placed, Shape, Vector

Span = tuple[float, float]


def span_mm(shape: Shape, axis: int) -> Span:
    """Low and high end of a shape in mm along one of the array's axes: 0 for x, 1 for y, 2 for z."""
    if isinstance(shape, Box):
        return shape.low[axis], shape.high[axis]
    half_mm = (shape.length_mm if "xyz"[axis] == shape.axis else shape.diameter_mm) / 2
    return shape.centre[axis] - half_mm, shape.centre[axis] + half_mm


def part_span_mm(part: Placed, axis: int) -> Span:
    """Low and high end of a placed part in mm along one of the array's axes."""
    spans = [span_mm(shape, axis) for shape in part.shapes]
    return min(low for low, _ in spans), max(high for _, high in spans)


def local_size_mm(part: Placed) -> Vector:
    """Size of a part in mm along its own x, y and z axes, which are parallel to the array's."""
    size = [high - low for low, high in (part_span_mm(part, axis) for axis in range(3))]
    x, y, z = (
        sum(abs(share) * mm for share, mm in zip(axis, size, strict=True))
        for axis in (part.frame.x, part.frame.y, part.frame.z)
    )
    return (x, y, z)
