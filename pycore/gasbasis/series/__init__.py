"""A series: the logger's file, restated row by row through the same paths as a single sheet."""
