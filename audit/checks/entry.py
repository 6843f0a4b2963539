"""A check as its entry declares it, and the refusal of entries that are not complete."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any, Literal

from audit.expression.nodes import Name, Node
from audit.expression.parse import BadExpression, parse
from audit.expression.units import nearest
from audit.limits.limits import BadRule

Severity = Literal["unsafe", "nuisance", "inconsistent", "observation"]
SEVERITIES: tuple[Severity, ...] = ("unsafe", "nuisance", "inconsistent", "observation")
BoundKind = Literal["at_least", "above", "at_most", "below", "equals", "must_be", "requires", "must_be_stated"]
NUMBER_BOUNDS: tuple[BoundKind, ...] = ("at_least", "above", "at_most", "below", "equals")
BOUND_KINDS: tuple[BoundKind, ...] = (*NUMBER_BOUNDS, "must_be", "requires", "must_be_stated")
CASE_RESULTS = ("meets", "breach", "unproven", "not applicable")
SUBJECTS = ("motor", "relay", "bus", "sisters", "peers")

_WORDS = ("says", "severity_because", "why", "blind_spots", "remedy", "source", "function")
_BOUND_KEYS = {"when", "judges", "within", "source", *BOUND_KINDS}
_KEYS = {*_WORDS, *_BOUND_KEYS, "subject", "severity", "evidence", "for_each", "unless_found", "stage", "bound", "case"}
_KEYS |= {"slips", "signs", "beyond", "judged_as"}


@dataclass(frozen=True, slots=True)
class Requirement:
    """One bound on one quantity, under its own condition if it has one."""

    kind: BoundKind
    judged: Node | None
    bound: Node | None
    within: Node | None = None
    when: Node | None = None
    text: str = ""

    def setting(self) -> str | None:
        """Give the name of the quantity judged, where it is one."""
        return self.judged.name if isinstance(self.judged, Name) else None


@dataclass(frozen=True, slots=True)
class Case:
    """A worked case: what is given, the hand working, and the verdict that it must give."""

    gives: str
    working: str
    given: Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class Check:
    """A declared requirement on one subject."""

    name: str
    pack: str
    subject: str
    function: str
    severity: Severity
    says: str
    severity_because: str
    why: str
    blind_spots: str
    remedy: str
    source: str
    when: Node
    when_text: str
    requirements: tuple[Requirement, ...]
    file: str
    evidence: tuple[str, ...] = ()
    unless_found: str | None = None
    stage: Literal["rows", "ranges"] = "rows"
    each: str | None = None
    judged_as: str = ""
    """What is judged in words, where the expression would not read well; {label} stands for the setting's label."""
    slips: Mapping[str, tuple[str, ...]] = field(default_factory=dict)
    """By the unit of what is judged ("1" for none): limits and quantities that a slip multiplies or divides by."""
    signs: tuple[str, ...] = ()
    """Limits near which a value that is judged points at a cause, which the limit says."""
    beyond: str | None = None
    """For a check of ranges: the limit that says how far outside its range a setting must lie."""
    cases: tuple[Case, ...] = field(default=())

    @property
    def key(self) -> str:
        """Give the name under which findings of this check are kept."""
        return f"{self.name}/{self.each}" if self.each else self.name


def _refuse(path: Path, name: str, problem: str, advice: str = "") -> BadRule:
    return BadRule(path.name, name, problem, advice)


def _parsed(path: Path, name: str, text: object) -> Node:
    try:
        return parse(text if isinstance(text, str) else repr(text))
    except BadExpression as error:
        raise _refuse(path, name, str(error)) from error


def _listed(value: object) -> list[Any]:
    return list(value) if isinstance(value, list) else [value]


def _requirements(path: Path, name: str, entry: Mapping[str, Any], inherited: object) -> list[Requirement]:
    judged_texts = _listed(entry.get("judges", inherited)) if entry.get("judges", inherited) is not None else []
    when = _parsed(path, name, entry["when"]) if "when" in entry else None
    within = _parsed(path, name, entry["within"]) if "within" in entry else None
    found: list[Requirement] = []
    for kind in BOUND_KINDS:
        if kind not in entry:
            continue
        bounds = _listed(entry[kind])
        if kind == "requires":
            found += [Requirement(kind, None, _parsed(path, name, text), None, when, str(text)) for text in bounds]
            continue
        if not judged_texts:
            raise _refuse(path, name, f"'{kind}' has nothing to judge", 'Add judges = "…".')
        judged = [_parsed(path, name, text) for text in judged_texts]
        if kind == "must_be":
            if entry[kind] not in ("on", "off"):
                raise _refuse(path, name, f"must_be is 'on' or 'off', not {entry[kind]!r}")
            found += [Requirement(kind, node, None, None, when, str(entry[kind])) for node in judged]
            continue
        if kind == "must_be_stated":
            found += [Requirement(kind, node, None, None, when, "") for node in judged]
            continue
        nodes = [_parsed(path, name, text) for text in bounds]
        if len(judged) not in (1, len(nodes)):
            raise _refuse(path, name, f"{len(judged)} quantities are judged against {len(nodes)} bounds")
        pairs = zip(judged * len(nodes) if len(judged) == 1 else judged, nodes, bounds, strict=True)
        found += [Requirement(kind, one, bound, within, when, str(text)) for one, bound, text in pairs]
    return found


def _cases(path: Path, name: str, entries: object) -> tuple[Case, ...]:
    cases = []
    for entry in _listed(entries or []):
        given = {key: value for key, value in entry.items() if key not in ("gives", "working")}
        if entry.get("gives") not in CASE_RESULTS:
            raise _refuse(path, name, f"a case gives one of {', '.join(CASE_RESULTS)}, not {entry.get('gives')!r}")
        if not str(entry.get("working", "")).strip():
            raise _refuse(path, name, "a case without its hand working", 'Write working = "…".')
        cases.append(Case(entry["gives"], str(entry["working"]), given))
    return tuple(cases)


def _filled(value: Any, words: Mapping[str, str]) -> Any:
    if isinstance(value, str):
        for placeholder, word in words.items():
            value = value.replace(f"{{{placeholder}}}", word)
        return value
    if isinstance(value, list):
        return [_filled(item, words) for item in value]
    if isinstance(value, dict):
        return {_filled(key, words): _filled(item, words) for key, item in value.items()}
    return value


def _eaches(path: Path, name: str, entry: Mapping[str, Any]) -> list[Mapping[str, str]]:
    """Give the words to fill in for each setting: its name, and what else the list says beside it."""
    eaches: list[Mapping[str, str]] = []
    for each in _listed(entry["for_each"]):
        words = {"setting": each} if isinstance(each, str) else each
        if not isinstance(words, dict) or not all(isinstance(word, str) for word in (words or {}).values()):
            raise _refuse(path, name, "'for_each' lists settings, or tables of words with the key 'setting'")
        if "setting" not in words:
            raise _refuse(path, name, "a table of 'for_each' has no 'setting'", 'Write { setting = "…", … }.')
        eaches.append(words)
    return eaches


def _slips(path: Path, name: str, entry: Mapping[str, Any]) -> dict[str, tuple[str, ...]]:
    slips = entry.get("slips", {})
    if not isinstance(slips, dict):
        raise _refuse(path, name, "'slips' lists factors by unit", 'Write slips = { a = ["…"], s = ["…"] }.')
    return {unit: tuple(_listed(names)) for unit, names in slips.items()}


def read_entry(path: Path, name: str, entry: object, pack: str) -> list[Check]:
    """Read one entry; an entry over each of several settings gives one check for each."""
    if not isinstance(entry, dict):
        raise _refuse(path, name, "a check is a table", f"Write [{name}] and its keys below it.")
    unknown = sorted(set(entry) - _KEYS)
    if unknown:
        raise _refuse(path, name, f"'{unknown[0]}' is not a key of a check{nearest(unknown[0], _KEYS)}")
    for word in (*_WORDS, "subject", "severity", "case"):
        if not entry.get(word):
            raise _refuse(path, name, f"'{word}' is lacking")
    if entry["severity"] not in SEVERITIES:
        raise _refuse(
            path, name, f"'{entry['severity']}' is not a severity{nearest(str(entry['severity']), SEVERITIES)}"
        )
    if entry["subject"] not in SUBJECTS:
        raise _refuse(path, name, f"'{entry['subject']}' is not a subject{nearest(str(entry['subject']), SUBJECTS)}")
    if entry.get("for_each") is None:
        return [_one(path, name, entry, pack, None)]
    eaches = _eaches(path, name, entry)
    cases = _listed(entry["case"])
    first = eaches[0]["setting"]
    for setting in {case.get("setting", first) for case in cases} - {words["setting"] for words in eaches}:
        raise _refuse(path, name, f"a case is for '{setting}', which 'for_each' does not list")
    # a case is for the setting that it names, else for the first of the list; it stands for all
    checks = []
    for words in eaches:
        own = [case for case in cases if case.get("setting", first) == words["setting"]]
        plain = [{key: value for key, value in case.items() if key != "setting"} for case in own]
        checks.append(_one(path, name, _filled({**entry, "case": plain}, words), pack, words["setting"]))
    return checks


def _one(path: Path, name: str, entry: Mapping[str, Any], pack: str, each: str | None) -> Check:
    when_text = str(entry.get("when", "yes"))
    plain = {key: value for key, value in entry.items() if key != "when"}
    requirements = _requirements(path, name, plain, None)
    for bound in _listed(entry.get("bound", [])):
        unknown = sorted(set(bound) - _BOUND_KEYS)
        if unknown:
            raise _refuse(path, name, f"'{unknown[0]}' is not a key of a bound{nearest(unknown[0], _BOUND_KEYS)}")
        requirements += _requirements(path, name, bound, entry.get("judges"))
    stage = entry.get("stage", "rows")
    if stage not in ("rows", "ranges"):
        raise _refuse(path, name, f"stage is 'ranges' or absent, not {stage!r}")
    if not requirements and stage == "rows":
        raise _refuse(path, name, "the check requires nothing", f"Write one of {', '.join(BOUND_KINDS)}.")
    return Check(
        name=name,
        pack=pack,
        subject=str(entry["subject"]),
        function=str(entry["function"]),
        severity=entry["severity"],
        says=str(entry["says"]),
        severity_because=str(entry["severity_because"]),
        why=str(entry["why"]),
        blind_spots=str(entry["blind_spots"]),
        remedy=str(entry["remedy"]),
        source=str(entry["source"]),
        when=_parsed(path, name, when_text),
        when_text=when_text,
        requirements=tuple(requirements),
        file=path.name,
        evidence=tuple(_listed(entry.get("evidence", []))),
        unless_found=entry.get("unless_found"),
        stage=stage,
        each=each,
        judged_as=str(entry.get("judged_as", "")),
        slips=_slips(path, name, entry),
        signs=tuple(_listed(entry.get("signs", []))),
        beyond=entry.get("beyond"),
        cases=_cases(path, name, entry.get("case")),
    )
