"""The cautions that go with every page that leaves the tool."""

CAUTIONS = (
    "Settings are changed only by qualified persons under the site's safe-work rules.",
    "Results rest on the data given.",
    "Limits are published guidance and common practice; the maker's data, local codes and the licensed engineer in "
    "charge decide.",
)
SHORT_CAUTION = " ".join(CAUTIONS)
