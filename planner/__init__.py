"""From a study to a proven answer: plant, market, dispatch, outcome, explore, results."""
