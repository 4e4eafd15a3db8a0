"""Random real figures against every decision; shares only the reader with the program."""
