"""Pure functions with their source and range; plain numbers in, plain numbers out."""
