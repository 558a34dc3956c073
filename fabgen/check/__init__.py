"""Stage 4: the arranged design is judged; one file per question a builder asks."""
