"""How often the answer is right: simulated logs with a known truth through the real review."""
