"""One small expression language for checks and recipes, walked for values, lacks, units and text."""
