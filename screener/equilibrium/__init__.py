"""Floor 2: phase equilibrium."""
