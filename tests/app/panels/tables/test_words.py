"""What is wrong, in sentences."""

from app.panels.tables.words import fault_words
from stackcore.errors import Fault


def test_fault_as_sentences() -> None:
    """Every sentence begins with a capital and ends once."""
    fault = Fault("x", "'a' is unknown, did you mean 'b'?", "one of b, c")

    assert fault_words(fault) == "'a' is unknown, did you mean 'b'? Allowed: one of b, c."
    assert fault_words(Fault("x", "it is too long")) == "It is too long."
