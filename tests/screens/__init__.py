"""Every screen, to be looked at, and what a test can see of each: names, cut words, reach by keys."""
