"""The answer under changed inputs: what changes (`changes`), and where it stops paying."""
