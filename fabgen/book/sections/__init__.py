"""The sections of the book: one file each, found by listing this folder."""
