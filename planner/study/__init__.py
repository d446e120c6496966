"""The study file: sections, reading, defaults, starters."""
