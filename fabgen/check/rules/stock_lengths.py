"""Can every piece be sawn from the stock?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """A03 a rod longer than its bar, A04 the boom; its trim and the bar's rough end counted."""
    shop = arranged.design.shop
    for cut in arranged.cuts:
        rod = cut.stock == "rod"
        stock_mm = shop.rod_stock_mm if rod else shop.boom_stock_mm
        usable_mm, wanted_mm = stock_mm - shop.end_trim_mm, cut.cut_mm + cut.trim_mm
        if wanted_mm > usable_mm + 1e-6:
            advice = (
                f"a bar of {stock_mm:g} mm gives {usable_mm:g} mm after {shop.end_trim_mm:g} mm of rough end; buy "
                f"longer stock and write shop: {{stock: {{{cut.stock}: …}}}}"
            )
            code = "A03" if rod else "A04"
            yield finding(code, "fail", cut.piece, advice, measured=wanted_mm, required=usable_mm, unit="mm")
