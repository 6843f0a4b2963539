"""Several sites side by side: by site, by function, and what they have in common."""
