"""The catalogue: names from entry points, the broken beside the healthy, every cause told to who asks."""

from __future__ import annotations

import re
import sys
from pathlib import Path

import pytest

from barnwright.errors import PluginError, UnknownProcessError
from barnwright.registry import Catalogue, catalogue, refresh
from barnwright.registry.entries import listing

PLUGINS = Path(__file__).resolve().parents[2] / "fixtures" / "plugins"


@pytest.fixture
def install(monkeypatch: pytest.MonkeyPatch) -> object:
    """A function that puts plugin folders on the import path and returns a catalogue that sees them."""

    def put(*folders: str | Path) -> Catalogue:
        for folder in folders:
            monkeypatch.syspath_prepend(PLUGINS / folder)
        return Catalogue(listing())

    return put


def test_names_are_sorted_and_carry_the_plugin(install) -> None:
    """The plugin is the distribution without ``barnwright-``; the order is alphabetical, not that of the path."""
    found = install("wrong_shape", "healthy", "negative")
    assert list(found.names()) == sorted(found.names())
    assert {"healthy/pair", "negative/pair", "wrong-shape/pair", "qed/compton", "qed/muon-pair"} <= set(found.names())


def test_listing_imports_no_plugin(install) -> None:
    """Names, distributions and versions come from metadata alone."""
    found = install("healthy")
    sys.modules.pop("healthy", None)
    entry = next(e for e in found.entries() if e.name == "healthy/pair")
    assert (entry.distribution, entry.version, entry.plugin) == ("healthy", "1.0", "healthy")
    assert "healthy" not in sys.modules


def test_a_process_is_loaded_once(install) -> None:
    """The second request gets the same object, with name, distribution, version and digest."""
    found = install("healthy")
    loaded = found.load("healthy/pair")
    assert found.load("healthy/pair") is loaded
    identity = loaded.identity
    assert (identity.name, identity.distribution, identity.version) == ("healthy/pair", "healthy", "1.0")
    assert re.fullmatch("[0-9a-f]{64}", identity.digest)


BROKEN = {
    "raises_on_import": "raises_on_import:process does not import: RuntimeError: the file with the form factors is ",
    "wrong_shape": "laws[0] (squared): expected an array that broadcasts to (point, node) = (3, 4), got shape (5,)",
    "not_a_number": "laws[0] (squared): expected finite numbers, got nan at sqrt_s = ",
    "negative": "laws[0] (squared): expected |M|² of at least 0 (or signed=True), got -0.",
    "needs_newer": "it needs transverse-polarisation, which this barnwright does not know: install a newer one",
}


@pytest.mark.parametrize("folder", BROKEN)
def test_a_broken_plugin_tells_its_cause_and_takes_nothing_down(install, folder: str) -> None:
    """Asking for it raises the cause with plugin and process, now and again; a neighbour works."""
    found = install(folder, "healthy")
    plugin = folder.replace("_", "-")
    message = f"plugin {plugin}, process {plugin}/pair: {BROKEN[folder]}"
    for _ in range(2):
        with pytest.raises(PluginError, match=re.escape(message)):
            found.load(f"{plugin}/pair")
    assert BROKEN[folder] in found.broken()[f"{plugin}/pair"]
    assert found.load("healthy/pair").process.name == "pair"


def test_two_distributions_that_claim_one_name_are_both_named(install) -> None:
    """The name belongs to neither, which is known from the listing alone."""
    found = install("claims_twice", "healthy")
    expected = "2 entry points claim this name: barnwright-twin 1.0 (twins:process) and twin 1.0 (twins:process)"
    assert found.broken()["twin/pair"].startswith(expected)
    with pytest.raises(PluginError, match=re.escape(expected)):
        found.load("twin/pair")
    assert found.load("healthy/pair").process.name == "pair"


@pytest.mark.parametrize(
    ("name", "near"), [("compton", "qed/compton"), ("qed/muonpair", "qed/muon-pair"), ("QED/Compton", "qed/compton")]
)
def test_an_unknown_name_gets_the_nearest(install, name: str, near: str) -> None:
    """A process without its plugin, or misspelt, is answered with the one that was meant."""
    with pytest.raises(UnknownProcessError, match=re.escape(f"process: got '{name}', expected one of ")) as caught:
        install().load(name)
    assert caught.value.violations[0].nearest == near


def write(folder: Path, module: str, point: str = "pair", name: str = "mended") -> None:
    """A plugin of one module below ``folder``."""
    meta = folder / f"{name}-1.0.dist-info"
    meta.mkdir(parents=True, exist_ok=True)
    (meta / "METADATA").write_text(f"Metadata-Version: 2.1\nName: {name}\nVersion: 1.0\n")
    (meta / "entry_points.txt").write_text(f"[barnwright.processes.v1]\n{point} = {name}_module:process\n")
    (folder / f"{name}_module.py").write_text(module)


HEALTHY = (PLUGINS / "healthy" / "healthy.py").read_text()


def test_an_object_that_is_no_process_is_refused(install, tmp_path: Path) -> None:
    """The entry point must name a Process."""
    write(tmp_path, "process = 3\n", name="notone")
    with pytest.raises(PluginError, match=r"notone_module:process is 3, expected a Process of barnwright.plugin"):
        install(tmp_path).load("notone/pair")


def test_a_process_answers_to_the_name_of_its_entry_point(install, tmp_path: Path) -> None:
    """Two names for one process would make two identities."""
    write(tmp_path, HEALTHY, point="other", name="othername")
    with pytest.raises(PluginError, match="calls itself 'pair', expected the name of its entry point, 'other'"):
        install(tmp_path).load("othername/other")


def test_an_entry_point_name_is_lower_case(install, tmp_path: Path) -> None:
    """A name that could not be asked for is broken from the listing on."""
    write(tmp_path, HEALTHY, point="Muon_Pair", name="uppercase")
    assert "expected lower case words" in install(tmp_path).broken()["uppercase/Muon_Pair"]


def test_a_wrong_declaration_is_told_with_plugin_and_field(install, tmp_path: Path) -> None:
    """What a Process says about itself at import comes through with the plugin's name."""
    write(tmp_path, HEALTHY.replace('mu- mu+"', 'mu- mu"'), name="misspelt")
    with pytest.raises(PluginError, match=r"plugin misspelt, process misspelt/pair: reaction: got 'e- e\+ -> mu- mu'"):
        install(tmp_path).load("misspelt/pair")


def test_a_plugin_that_leaves_the_interpreter_does_not(install, tmp_path: Path) -> None:
    """sys.exit at import is a fault of the plugin, not the end of the process."""
    write(tmp_path, "import sys\nsys.exit(2)\n", name="leaver")
    with pytest.raises(PluginError, match="leaver_module:process does not import: SystemExit: 2"):
        install(tmp_path).load("leaver/pair")


def test_an_interrupt_names_the_process(install, tmp_path: Path) -> None:
    """Ctrl-C while a plugin hangs at load ends it, says which process it was, and does not mark it as broken."""
    write(tmp_path, "raise KeyboardInterrupt\n", name="hanging")
    found = install(tmp_path)
    with pytest.raises(KeyboardInterrupt, match="interrupted while process hanging/pair of hanging was imported"):
        found.load("hanging/pair")
    assert "hanging/pair" not in found.broken()


def test_refresh_gives_a_mended_plugin_another_chance(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """After the file is mended and the catalogue refreshed, the process loads, with the digest of the mended file."""
    write(tmp_path, "raise RuntimeError('broken')\n")
    monkeypatch.syspath_prepend(tmp_path)
    try:
        with pytest.raises(PluginError, match="RuntimeError: broken"):
            refresh().load("mended/pair")
        assert "mended/pair" in catalogue().broken()
        write(tmp_path, HEALTHY)
        mended = refresh().load("mended/pair")
        assert mended.process.name == "pair"
        assert catalogue().load("mended/pair") is mended
    finally:
        monkeypatch.undo()
        refresh()
