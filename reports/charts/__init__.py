"""One figure a module, vector, one palette."""
