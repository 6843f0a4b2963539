"""Two audits of a fleet side by side: what changed, what it breaks, whom it touches, what is to be looked at."""

from audit.findings.comparison.comparison import DEFAULT_SHARE_PCT, Comparison, Supposed, compare

__all__ = ["DEFAULT_SHARE_PCT", "Comparison", "Supposed", "compare"]
