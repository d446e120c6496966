"""Ratios and figures measured side by side, never timed tests."""
