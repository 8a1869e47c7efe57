"""What may be put into a mechanism to take the effort out of the hand, and how free its sizes are."""
