"""Stage 5: sheets as plain primitives in mm."""
