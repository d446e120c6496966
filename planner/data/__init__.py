"""Published values, one cited fact a row."""
