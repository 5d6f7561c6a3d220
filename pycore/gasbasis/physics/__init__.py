"""Pure SI functions: formulas and nothing else. No tables, no text, no units."""
