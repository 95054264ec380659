"""How fast and how large, as ratios of two things measured in one run; nothing here is a test."""
