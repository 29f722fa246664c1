"""What is wrong, in sentences. No toolkit."""

from stackcore.errors import Fault


def fault_words(fault: Fault) -> str:
    """Return what is wrong and what is allowed as sentences.

    Examples
    --------
    >>> fault_words(Fault("", "unknown unit 'mmm', did you mean 'mm'?", "a length, for example 2 mm"))
    "Unknown unit 'mmm', did you mean 'mm'? Allowed: a length, for example 2 mm."
    """
    message = fault.message[:1].upper() + fault.message[1:]
    sentences = [message, f"Allowed: {fault.allowed}"] if fault.allowed else [message]
    return " ".join(text if text.endswith((".", "?", "!")) else f"{text}." for text in sentences)
