"""Stage 3: stations, holes and placed parts as numbers."""
