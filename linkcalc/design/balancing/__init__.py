"""Counterweights and springs that take the effort out of the hand: how they are found."""
