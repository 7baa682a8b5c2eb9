"""Small floors in other offices' habits: what is meant, and how each office draws it."""
