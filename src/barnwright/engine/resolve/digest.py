"""The digest of a plan: SHA-256 over everything that shapes its numbers."""

from __future__ import annotations

import hashlib
import json
from functools import lru_cache
from typing import Any

from barnwright.engine.plan import Group, Member
from barnwright.engine.setting import Layout, Setting
from barnwright.observables import Cut


def plan_digest(members: tuple[Member, ...], groups: tuple[Group, ...]) -> str:
    """64 hexadecimal digits. What only says when to stop is left out, and so are units and names of the answer."""
    content: dict[str, Any] = {
        "members": [_member(member) for member in members],
        "groups": [[g.points, [[_setting(one) for one in share.settings] for share in g.shares]] for g in groups],
    }
    text = json.dumps(content, sort_keys=True, separators=(",", ":"))
    return hashlib.sha256(text.encode()).hexdigest()


def _member(member: Member) -> list[Any]:
    source = member.source
    identity = [source.name, source.distribution, source.version, source.digest]
    return [identity, member.reaction.text, _layout_digest(member.layout)]


@lru_cache(maxsize=256)
def _layout_digest(layout: Layout) -> str:
    """The digest of the components, which many requests share."""
    histograms = [[h.name, [o.text for o in h.observables], h.edges] for h in layout.histograms]
    asymmetries = [[a.name, a.observable.text, a.at] for a in layout.asymmetries]
    return hashlib.sha256(json.dumps([histograms, asymmetries]).encode()).hexdigest()


def _setting(setting: Setting) -> list[Any]:
    beams = setting.beams
    return [
        setting.name,
        [beams.given, beams.first, beams.second, beams.orientation, beams.target],
        [beams.polarisation, beams.crossing_angle],
        setting.masses,
        setting.parameters,
        [_cut(cut) for cut in setting.cuts],
        [setting.rule, setting.closed_form, setting.law, setting.peaks],
        [[name, sorted(parts or ())] for name, parts in setting.parts],
    ]


def _cut(cut: Cut) -> list[Any]:
    return [cut.name, cut.observable.text, cut.min, cut.max, cut.outside]
