"""The sheets of a package: one file each with a function `sheets`."""
