"""How materials are called in the table."""

from dataclasses import replace

from app.document.session import Session
from app.panels.elements.names import MaterialNames, library_offers
from stackcore.job.records import JobRecord, MaterialRecord
from stackcore.media.library import read_library


def with_materials(*materials: MaterialRecord) -> JobRecord:
    """Return the untitled job's record with other materials."""
    return replace(Session().record, materials=materials)


def skin(name: str, label: str = "") -> MaterialRecord:
    """Return a material."""
    return MaterialRecord(name, label=label, model="constant", constants={"permittivity": 4 + 0j})


def test_labels_that_agree_are_told_apart() -> None:
    """Two materials of one label are shown with their names; a single one is not, and both ways agree."""
    names = MaterialNames(with_materials(skin("a", "Skin"), skin("b", "skin"), skin("c", "Core"), skin("d")))

    assert [names.shown(name) for name in "abcd"] == ["Skin (a)", "skin (b)", "Core", "d"]
    assert [names.given(names.shown(name)) for name in "abcd"] == list("abcd")


def test_label_that_reads_like_air_does_not_hide_air() -> None:
    """A material labelled air is shown with its name, and air stays air."""
    names = MaterialNames(with_materials(skin("gas", "Air")))

    assert names.shown("gas") == "Air (gas)"
    assert names.given("air") == "air"


def test_offers_come_in_the_order_of_use() -> None:
    """First the job's materials, then air, a perfect conductor where it may be, and then the whole library."""
    names = MaterialNames(with_materials(skin("a", "Skin")))
    offers = names.offers(with_metal=True)

    assert offers[:3] == ("Skin", "air", "perfect conductor")
    assert len(offers) == 3 + len(read_library().entries)
    assert "perfect conductor" not in names.offers(with_metal=False)


def test_every_offer_is_understood() -> None:
    """Each text that is offered stands for one material or library entry, also in the wrong case."""
    names = MaterialNames(with_materials(skin("a", "Skin")))

    assert names.given("PERFECT conductor") == "metal"
    assert len(set(library_offers().values())) == len(library_offers())
    assert all(names.given(text.upper()) == key for key, text in library_offers().items())


def test_a_label_of_the_library_alone_is_understood() -> None:
    """Copper typed as one says it is the library's copper, unless the job has a material of that name."""
    assert MaterialNames(with_materials()).given("copper") == "metals/copper"
    assert MaterialNames(with_materials(skin("a", "Copper"))).given("copper") == "a"
    assert MaterialNames(with_materials(skin("copper", "Foil"))).given("COPPER") == "copper"


def test_names_are_known_in_any_case() -> None:
    """Air, a perfect conductor and the names of the job are meant however they are spelled."""
    names = MaterialNames(with_materials(skin("skin-a", "Skin")))
    assert [names.given(text) for text in ("AIR", "Metal", "Skin-A")] == ["air", "metal", "skin-a"]


def test_other_text_comes_back() -> None:
    """What is not known here is left to the edit that takes it."""
    assert MaterialNames(with_materials()).given(" metals/copper ") == "metals/copper"
