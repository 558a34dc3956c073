"""Tables of materials, drills, fasteners, tolerances and paper; the source in every row."""
