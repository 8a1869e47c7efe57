"""The commands as a stranger meets them: what they print, write and refuse."""
