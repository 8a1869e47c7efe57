"""The questions that a designer asks, one file each."""
