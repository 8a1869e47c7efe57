"""What linkcalc is timed against, and the linkages that every competitor solves."""
