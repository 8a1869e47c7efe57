"""Independent solutions of the same mechanics: they share no code with linkcalc, so that they can judge it."""
