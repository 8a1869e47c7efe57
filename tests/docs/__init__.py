"""The pages of the documentation: their commands run, excerpts are what is printed, links lead somewhere."""
