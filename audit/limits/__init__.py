"""Named limits with unit and source, and what a site puts in their place."""
