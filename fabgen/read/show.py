"""Every value in force as a design file, each line with where it came from; reading it back gives the same design."""

import json
import re
from collections.abc import Iterator
from decimal import Decimal

from fabgen.design.design import AllowanceChoice, Bush, Element, Keeper, Material, Mount, Saddle
from fabgen.read.limits import shown_limits
from fabgen.read.places import node_at
from fabgen.read.reader import Reading
from fabgen.read.yaml_tree import Map, Scalar, Seq

_PLAIN = re.compile(r"[A-Za-z0-9][A-Za-z0-9 ._/()-]*[A-Za-z0-9)]|[A-Za-z0-9]")
_COMMENT_COLUMN = 52


def show(reading: Reading) -> str:
    """Print a design with every value in force.

    Args:
        reading: what `read_design` returned.

    Returns:
        A valid design file; its comments say `line N`, the default's reason, or how a value was computed.
    """
    return "\n".join(_Shown(reading).lines()) + "\n"


def mm(length_mm: float) -> str:
    """A length that reads back to the same number."""
    return f"{int(length_mm)} mm" if length_mm == int(length_mm) else f"{Decimal(repr(length_mm)):f} mm"


def word(text: str) -> str:
    """A text as YAML reads it back: plain where that is safe, else in double quotes."""
    plain = _PLAIN.fullmatch(text) and text.lower() not in ("null", "true", "false", "yes", "no", "on", "off")
    return text if plain else json.dumps(text, ensure_ascii=False)


class _Shown:
    """Lines of one design, in the order of the grammar."""

    def __init__(self, reading: Reading) -> None:
        self.design = reading.design
        self.tree = reading.tree
        self.reasons = reading.reasons
        self.file = reading.tree.source.shown_as

    def lines(self) -> Iterator[str]:
        """The whole file."""
        design = self.design
        yield self._line("fabgen", "1")
        yield self._line("title", word(design.title))
        yield self._line("number", word(design.number))
        yield self._line("revision", word(design.revision))
        yield self._line("frequency", f"{design.frequency_mhz!r} MHz")
        if "units" in self.tree:
            yield self._line("units", str(self.tree["units"]))
        yield self._line("polarisation", design.polarisation)
        yield from self._sheet()
        yield from self._boom()
        yield from self._mounts()
        yield from self._elements()
        yield self._line("lengths_are", design.lengths_are)
        yield from self._feed()
        yield from self._clamp()
        yield "clearance:"
        yield self._line("clearance.tip", mm(design.tip_clearance_mm))
        limits = [self._line(f"limits.{key}", value) for key, value in shown_limits(design.limits)]
        yield from ["limits:", *limits] if limits else []
        yield from self._shop()
        yield from self._printer()

    def _line(self, path: str, value: str, origin: str = "") -> str:
        """`key: value  # where from`, indented by the path's depth."""
        *above, key = path.split(".")
        text = f"{'  ' * len(above)}{key}: {value}"
        return f"{text:<{_COMMENT_COLUMN}}  # {origin or self._origin(path)}"

    def _origin(self, path: str) -> str:
        """Where the value at a path came from."""
        node = node_at(self.tree, *path.split("."))
        if node is not None and path not in self.reasons:
            return self._place(node)
        return self.reasons.get(path, "left out")

    def _place(self, node: Scalar | Map | Seq) -> str:
        table = "" if node.source.shown_as == self.file else f" of {node.source.shown_as}"
        return f"line {node.line}{table}"

    def _sheet(self) -> Iterator[str]:
        sheet = self.design.sheet
        fields = {"owner": sheet.owner, "creator": sheet.creator, "approved": sheet.approved, "date": sheet.date}
        if any(fields.values()):
            yield "sheet:"
        for key, value in fields.items():
            if value:
                yield self._line(f"sheet.{key}", word(value))

    def _boom(self) -> Iterator[str]:
        boom = self.design.boom
        rectangular = boom.section == "rectangular"
        yield "boom:"
        yield self._line("boom.section", boom.section)
        size = f"[{mm(boom.width_mm)}, {mm(boom.height_mm)}]" if rectangular else mm(boom.width_mm)
        yield self._line("boom.outside", size)
        if boom.hollow:
            yield self._line("boom.wall", mm(boom.wall_mm))
        else:
            yield f"  # wall: none, {self.reasons['boom.wall']}"
        yield self._line("boom.corner_radius", mm(boom.corner_radius_mm))
        yield from self._material("boom.material", boom.material)
        yield "  overhang:"
        yield self._line("boom.overhang.rear", mm(boom.rear_mm))
        if node_at(self.tree, "boom", "overhang", "front") is not None:
            yield self._line("boom.overhang.front", mm(boom.front_mm))
            yield f"  # length: {mm(boom.length_mm)}, computed, rear + span + front"
        else:
            path = "boom.overhang.length" if "length" in self._map("boom", "overhang") else "boom.length"
            yield self._line("boom.overhang.length", mm(boom.length_mm), self._origin(path))
            yield f"  # front: {mm(boom.front_mm)}, computed, length − rear − span"

    def _map(self, *path: str) -> Map:
        node = node_at(self.tree, *path)
        assert isinstance(node, Map)
        return node

    def _material(self, path: str, material: Material) -> Iterator[str]:
        """A material by name, or with its properties when the file states them."""
        if not isinstance(node_at(self.tree, *path.split(".")), Map):
            yield self._line(path, word(material.name))
        else:
            yield self._line(path, _material_mapping(material))

    def _mounts(self) -> Iterator[str]:
        used: dict[str, list[Mount]] = {}
        for element in self.design.elements:
            if element.mount is not None and element.mount not in used.setdefault(element.mount.name, []):
                used[element.mount.name].append(element.mount)
        if used:
            yield "mounts:"
        for name in self._map("mounts") if used else ():
            if name in used:
                yield f"  {word(name)}:"
                yield from self._mount(f"mounts.{name}", used[name])

    def _mount(self, path: str, mounts: list[Mount]) -> Iterator[str]:
        """One mount; a size that differs from rod to rod stands in a comment and is computed again when read."""
        first = mounts[0]
        yield self._line(f"{path}.style", first.style)
        if first.style != "on-top":
            yield self._size(f"{path}.hole", [mount.hole_mm for mount in mounts])
        if first.bond is not None:
            yield self._line(f"{path}.bond", first.bond)
        elif first.hold != "bond":
            yield self._line(f"{path}.hold", first.hold)
        yield from self._bushes(f"{path}.bush", [mount.bush for mount in mounts if mount.bush is not None])
        yield from self._keepers(f"{path}.keeper", [mount.keeper for mount in mounts if mount.keeper is not None])
        yield from self._saddles(f"{path}.saddle", [mount.saddle for mount in mounts if mount.saddle is not None])
        yield from self._allowance(f"{path}.allowance", first.allowance)

    def _size(self, path: str, sizes_mm: list[float]) -> str:
        """One size, or a comment with all of them."""
        if len(set(sizes_mm)) == 1:
            return self._line(path, mm(sizes_mm[0]))
        *above, key = path.split(".")
        listed = ", ".join(mm(size_mm) for size_mm in sorted(set(sizes_mm)))
        return f"{'  ' * len(above)}# {key}: {listed}, by rod: {self._origin(path)}"

    def _bushes(self, path: str, bushes: list[Bush]) -> Iterator[str]:
        if not bushes:
            return
        yield "    bush:"
        yield self._line(f"{path}.kind", bushes[0].kind)
        yield from self._material(f"{path}.material", bushes[0].material)
        yield self._size(f"{path}.bore", [bush.bore_mm for bush in bushes])
        yield self._size(f"{path}.spigot", [bush.spigot_mm for bush in bushes])
        yield self._size(f"{path}.spigot_length", [bush.spigot_length_mm for bush in bushes])
        yield self._size(f"{path}.flange", [bush.flange_mm for bush in bushes])
        yield self._size(f"{path}.flange_height", [bush.flange_height_mm for bush in bushes])

    def _keepers(self, path: str, keepers: list[Keeper]) -> Iterator[str]:
        if not keepers:
            return
        yield "    keeper:"
        yield self._line(f"{path}.kind", keepers[0].kind)
        yield from self._material(f"{path}.material", keepers[0].material)
        yield self._size(f"{path}.bore", [keeper.bore_mm for keeper in keepers])
        yield self._size(f"{path}.outside", [keeper.outside_mm for keeper in keepers])
        yield self._size(f"{path}.length", [keeper.length_mm for keeper in keepers])

    def _saddles(self, path: str, saddles: list[Saddle]) -> Iterator[str]:
        if not saddles:
            return
        yield "    saddle:"
        yield self._size(f"{path}.height", [saddle.height_mm for saddle in saddles])
        yield self._size(f"{path}.bore", [saddle.bore_mm for saddle in saddles])
        yield self._line(f"{path}.screw", saddles[0].screw)
        yield from self._material(f"{path}.material", saddles[0].material)

    def _allowance(self, path: str, choice: AllowanceChoice) -> Iterator[str]:
        yield f"{'  ' * path.count('.')}allowance:"
        shorthand = node_at(self.tree, *path.split("."))
        origin = self._place(shorthand) if isinstance(shorthand, Scalar) else ""
        if f"{path}.origin" in self.reasons:
            origin = self.reasons[f"{path}.origin"]
        yield self._line(f"{path}.origin", choice.origin, origin)
        if choice.origin == "published":
            yield self._line(f"{path}.model", choice.model)
            yield self._line(f"{path}.square_as", choice.square_as)
        if choice.origin == "stated":
            yield self._line(f"{path}.value", mm(choice.value_mm))
            yield self._line(f"{path}.uncertainty", mm(choice.uncertainty_mm))
            yield self._line(f"{path}.source", word(choice.source))

    def _elements(self) -> Iterator[str]:
        rows = self.tree["elements"]
        assert isinstance(rows, Seq)
        nodes = {str(row["id"]): row for row in rows if isinstance(row, Map)}
        yield "elements:"
        for element in self.design.elements:
            yield f"  - {{{', '.join(self._row(element))}}}  # {self._row_origin(element, nodes[element.id])}"

    def _row(self, element: Element) -> Iterator[str]:
        yield f"id: {word(element.id)}"
        yield f"role: {element.role}"
        yield f"at: {mm(element.at_mm)}"
        yield f"length: {mm(element.length_mm)}"
        yield f"mount: {word(element.mount.name) if element.mount is not None else 'feed'}"
        yield f"diameter: {mm(element.rod.diameter_mm)}"
        if element.rod.modelled_diameter_mm is not None:
            yield f"modelled_diameter: {mm(element.rod.modelled_diameter_mm)}"
        material = element.rod.material
        yield f"material: {_material_mapping(material) if _is_stated(material) else word(material.name)}"
        yield f"finish: {element.rod.finish}"

    def _row_origin(self, element: Element, node: Map) -> str:
        """The row's line, and where what it leaves out came from."""
        parts = [f"{self._place(node)}; station {mm(element.station_mm)}"]
        if "mount" not in node:
            parts.append("mount: the feed" if element.mount is None else "mount: the only one")
        fed = element.role == "driven" and node_at(self.tree, "feed", "rod") is not None
        for key in ("diameter", "material", "finish"):
            if key in node:
                continue
            above = node_at(self.tree, "feed", "rod") if fed and key == "diameter" else node_at(self.tree, "rods", key)
            parts.append(f"{key}: {self._place(above) if above is not None else 'default'}")
        return "; ".join(parts)

    def _feed(self) -> Iterator[str]:
        if not self.design.feeds:
            return
        feed = self.design.feeds[0]
        yield f"feed:  # carries {feed.element}"
        yield self._line("feed.kind", feed.kind)
        yield self._line("feed.gap", mm(feed.gap_mm))
        yield self._line("feed.height", mm(feed.height_mm))
        yield self._line("feed.cable", mm(feed.cable_mm))
        if feed.kind == "folded-dipole":
            yield self._line("feed.spacing", mm(feed.spacing_mm))
        yield from self._material("feed.material", feed.material)
        yield self._line("feed.reference", f"{feed.reference_ohm!r} ohm")
        yield from self._allowance("feed.allowance", feed.allowance)

    def _clamp(self) -> Iterator[str]:
        clamp = self.design.clamp
        if clamp is None:
            return
        yield "clamp:"
        yield self._line("clamp.at", "balance" if clamp.at_mm is None else mm(clamp.at_mm))
        yield self._line("clamp.mast", mm(clamp.mast_mm))
        yield self._line("clamp.plate", mm(clamp.plate_mm))
        yield from self._material("clamp.material", clamp.material)

    def _shop(self) -> Iterator[str]:
        shop = self.design.shop
        yield "shop:"
        stated = shop.stated_tolerance_mm
        yield self._line("shop.tolerance", mm(stated) if stated else shop.tolerance)
        yield self._line("shop.cut_step", mm(shop.cut_step_mm))
        yield self._line("shop.saw_kerf", mm(shop.saw_kerf_mm))
        yield self._line("shop.end_trim", mm(shop.end_trim_mm))
        yield "  stock:"
        yield self._line("shop.stock.rod", mm(shop.rod_stock_mm))
        yield self._line("shop.stock.boom", mm(shop.boom_stock_mm))
        yield self._line("shop.drills", shop.drills)
        yield self._line("shop.paper", shop.paper)
        yield self._line("shop.paper_thickness", mm(shop.paper_thickness_mm))

    def _printer(self) -> Iterator[str]:
        printer = self.design.printer
        yield "printer:"
        yield self._line("printer.bed", f"[{', '.join(mm(side_mm) for side_mm in printer.bed_mm)}]")
        yield self._line("printer.nozzle", mm(printer.nozzle_mm))
        yield self._line("printer.hole_growth", mm(printer.hole_growth_mm))


def _is_stated(material: Material) -> bool:
    return bool(material.source == Material.__dataclass_fields__["source"].default)


def _material_mapping(material: Material) -> str:
    numbers = {
        "density": material.density_kg_m3,
        "youngs_modulus": material.youngs_modulus_gpa,
        "yield": material.yield_mpa,
        "expansion": material.expansion_per_k,
        "anodic_index": None if material.anodic_index_cv is None else material.anodic_index_cv / 100,
        "permittivity": material.permittivity,
    }
    keys = [f"name: {word(material.name)}", f"kind: {material.kind}"]
    keys += [f"{key}: {number!r}" for key, number in numbers.items() if number is not None]
    keys.append(f"conductive: {'true' if material.conductive else 'false'}")
    return f"{{{', '.join(keys)}}}"
