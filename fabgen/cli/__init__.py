"""Options in, text out."""
