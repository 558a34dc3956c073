"""The array solver asked about one design: response, tolerances, common error. Loads numpy and scipy."""
