"""The commands, one file each, with a click command of the file's name; found by listing this folder."""
