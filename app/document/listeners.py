"""Who wants to hear of changes: plain callables, called in the order they came."""

from collections import deque
from collections.abc import Callable
from typing import Generic, TypeVar

Report = Callable[[Exception], None]
"""Takes an error that a listener raised."""

Message = TypeVar("Message")


class Listeners(Generic[Message]):
    """Tells every listener every message, each message to all before the next.

    A listener may itself cause a change: that message waits until everybody has heard the present one, so
    that nobody hears the later change first. An error in one listener does not keep the message from the
    others: with `report` it is handed there, and without it all errors of the round are raised together at
    the end as an ``ExceptionGroup``.
    """

    def __init__(self, report: Report | None = None) -> None:
        self._listeners: list[Callable[[Message], None]] = []
        self._waiting: deque[Message] = deque()
        self._telling = False
        self._report = report

    def subscribe(self, listener: Callable[[Message], None]) -> Callable[[], None]:
        """Add `listener` and return the function that takes it out again (harmless when called twice)."""
        self._listeners.append(listener)

        def unsubscribe() -> None:
            if listener in self._listeners:
                self._listeners.remove(listener)

        return unsubscribe

    def tell(self, message: Message) -> None:
        """Tell `message` to all listeners, or put it in line when another is being told."""
        self._waiting.append(message)
        if self._telling:
            return
        errors: list[Exception] = []
        self._telling = True
        try:
            while self._waiting:
                self._tell_all(self._waiting.popleft(), errors)
        finally:
            self._telling = False
            self._waiting.clear()
        if errors:
            raise ExceptionGroup("listeners failed", errors)

    def _tell_all(self, message: Message, errors: list[Exception]) -> None:
        for listener in tuple(self._listeners):
            if listener not in self._listeners:
                continue
            try:
                listener(message)
            except Exception as error:
                if self._report is None:
                    errors.append(error)
                else:
                    self._report(error)
