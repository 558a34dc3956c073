"""Stage 7: one writer per format."""
