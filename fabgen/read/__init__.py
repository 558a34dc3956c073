"""Stage 1: a YAML file with positions becomes a validated design."""
