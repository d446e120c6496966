"""The cheapest year and its proof: model, solve, bounds, verification."""
