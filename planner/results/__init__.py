"""The answer and its folder: what every report is made from."""
