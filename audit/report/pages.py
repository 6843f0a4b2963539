"""Pages made from the rules and the vocabulary: README.md, QUANTITIES.md and FUNCTIONS.md in the folder of rules."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import groupby

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.checks.entry import Check
from audit.checks.wording import requirement_in_words
from audit.expression.text import render
from audit.limits.limits import limit_in_words
from audit.report.function_page import functions_page
from audit.rule_folder import rules_folder
from audit.vocabulary.quantities import Quantity, vocabulary

MADE = "<!-- made by `python -m audit.report.pages`; a test holds this page against the files that it is made from -->"


def rules_page(catalogue: Catalogue) -> str:
    """Give the catalogue as a page: packs, functions, checks with their worked cases, recipes, limits."""
    return "\n".join(_rules_lines(catalogue)) + "\n"


def _rules_lines(catalogue: Catalogue) -> Iterator[str]:
    by_name = {check.name: check for check in reversed(catalogue.checks)}
    checks = sorted(by_name.values(), key=lambda check: (check.pack != "core", check.pack, check.file, check.name))
    cases = sum(len(check.cases) for check in catalogue.checks)
    yield MADE
    yield "# The rules"
    yield ""
    yield (
        f"{len(checks)} checks in {len(catalogue.packs())} packs, {len(catalogue.recipes)} derived quantities, "
        f"{len(catalogue.limits)} limits, {cases} worked cases. A check is one TOML entry; how to add one stands in "
        "DEVELOPERS.md. `motor-audit checks NAME` prints one check, `--verify` runs every worked case."
    )
    yield ""
    yield (
        "Limits are published guidance and common practice. The maker's data, local codes and the licensed engineer in "
        "charge decide. Standards were read in copies and handbooks, not from their publishers; 'from memory' says so."
    )
    for pack, in_pack in groupby(checks, key=lambda check: check.pack):
        yield ""
        yield f"## Pack: {pack}"
        for file, in_file in groupby(in_pack, key=lambda check: check.file):
            yield ""
            yield f"### {file}"
            for check in in_file:
                yield from _check_lines(check, catalogue)
    yield ""
    yield "## Derived quantities"
    yield ""
    for recipe in sorted(catalogue.recipes.values(), key=lambda recipe: (recipe.file, recipe.name)):
        ways = "; ".join(f"{_basis_word(way.basis)}: `{way.text}`" for way in recipe.ways)
        note = f" Assumption: {recipe.note}." if recipe.note else ""
        source = f" Source: {recipe.source}." if recipe.source else ""
        yield f"- **{recipe.name}** ({recipe.subject}): {recipe.label}. {ways}.{note}{source}"
    yield ""
    yield "## Limits"
    yield ""
    yield "| limit | value | what it is | source |"
    yield "| --- | --- | --- | --- |"
    for limit in sorted(catalogue.limits.values(), key=lambda limit: limit.name):
        yield f"| {limit.name} | {limit_in_words(limit)} | {limit.says} | {limit.source} |"


def _basis_word(basis: int) -> str:
    return ("recorded", "stated", "calculated", "assumed")[basis]


def _check_lines(check: Check, catalogue: Catalogue) -> Iterator[str]:
    label, reads = catalogue.label_of, catalogue.reads
    yield ""
    yield f"#### {check.name}"
    yield f"{check.function} · {check.severity} · {check.subject}. {check.says}."
    yield ""
    yield f"- applies when: {render(check.when, label, reads)}"
    for requirement in check.requirements:
        yield f"- wanted: {requirement_in_words(requirement, label, reads)}"
    if check.evidence:
        yield f"- judged only where given: {', '.join(map(label, check.evidence))}"
    yield f"- severity because {check.severity_because}"
    yield f"- why: {check.why}"
    yield f"- blind spots: {check.blind_spots}"
    yield f"- remedy: {check.remedy}"
    yield f"- source: {check.source}"
    for case in check.cases:
        yield f"- case, {case.gives}: {case.working}"


def quantities_page() -> str:
    """Give the glossary of quantities as a page."""
    return "\n".join(_quantity_lines()) + "\n"


def _quantity_lines() -> Iterator[str]:
    yield MADE
    yield "# Quantities"
    yield ""
    yield "Every datum and setting that the reader knows, with the headers that it is recognised by."
    for subject, quantities in groupby(vocabulary().quantities.values(), key=lambda quantity: quantity.subject):
        yield ""
        yield f"## {subject}"
        yield ""
        yield "| name | what it is | unit or choices | plausible | headers |"
        yield "| --- | --- | --- | --- | --- |"
        for quantity in quantities:
            yield _quantity_row(quantity)


def _quantity_row(quantity: Quantity) -> str:
    kind = ", ".join(quantity.choices) or (quantity.unit.symbol or "number" if quantity.unit else quantity.kind)
    plausible = f"{quantity.plausible[0]:g} to {quantity.plausible[1]:g}" if quantity.plausible else ""
    headers = ", ".join(quantity.headers).replace("|", "/")
    if quantity.element and quantity.part != "own":
        headers = f"words of the element '{quantity.element}' and of '{quantity.part}'" + (
            f"; {headers}" if headers else ""
        )
    return f"| {quantity.name} | {quantity.label} | {kind} | {plausible} | {headers} |"


def pages() -> dict[str, str]:
    """Give every page by its file name."""
    return {
        "README.md": rules_page(load_catalogue()),
        "QUANTITIES.md": quantities_page(),
        "FUNCTIONS.md": functions_page(MADE),
    }


def main() -> None:
    """Write every page."""
    for name, page in pages().items():
        (rules_folder() / name).write_text(page, encoding="utf-8")


if __name__ == "__main__":
    main()
