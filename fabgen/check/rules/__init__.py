"""The rules: one file per question a builder asks, each with a function `findings`."""
