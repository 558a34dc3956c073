"""Stage 2: modelled lengths become cut lengths, line by line."""
