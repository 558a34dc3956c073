"""Stage 8: the build book."""
