"""From a results folder to a PDF; knows nothing of planner or load_profiles."""
