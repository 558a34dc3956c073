"""One printed, made or bought part per file."""
