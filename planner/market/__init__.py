"""Tariffs to hourly prices, metered flows to a bill."""
