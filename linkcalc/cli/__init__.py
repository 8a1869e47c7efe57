"""The command line: parse, ask, print."""
