"""Machines and recovered heat, hour by hour."""
