"""A face in the hand: turns px into thickness, one undo step for the whole way, and back again on request."""

from app.document import edits
from app.document.session import Session
from app.panels.wall.layout import Face, Held, WallLayout
from app.panels.wall.parts import LayerPart
from stackcore.errors import Fault

SLACK = 3.0
"""How far the hand must move before a press becomes a drag, in px."""


class FaceDrag:
    """A drag of one face, from press to release.

    The scale is frozen and so is everything on the far side of the layer, so that the face stays under the hand
    and only this layer's thickness changes; the drawing finds its new scale when the drag is over.

    Parameters
    ----------
    session
        Where each movement is applied.
    initiator
        In whose name.
    layout
        The drawing when the face was caught.
    face
        The face.
    x
        Where the hand caught it, in px.
    """

    def __init__(self, session: Session, initiator: object, layout: WallLayout, face: Face, x: float) -> None:
        part = layout.wall.elements[face.row]
        if not isinstance(part, LayerPart):
            raise ValueError(f"element {face.row} has no face")
        self._session, self._initiator = session, initiator
        self._stack = session.selection.stack
        self._start = session.document
        self._merge_key = ("drag", object())
        self._x = x
        self._width = layout.scale.width(part.thickness)
        self._thickness = part.thickness
        self.face = face
        outer = layout.edges[0] if face.side == "back" else layout.edges[-1]
        self.held = Held(layout.scale, "front" if face.side == "back" else "back", outer)
        self.moving = False

    def move(self, x: float) -> tuple[Fault, ...]:
        """Take the face to `x`; returns the faults when the thickness is refused."""
        way = x - self._x
        self.moving = self.moving or abs(way) >= SLACK
        if not self.moving:
            return ()
        width = self._width + (way if self.face.side == "back" else -way)
        thickness = self.held.scale.rounded(width)
        if thickness == self._thickness:
            return ()
        self._thickness = thickness
        edit = edits.set_thickness(self._stack, self.face.row, thickness, merge_key=self._merge_key)
        return self._session.apply(edit, self._initiator)

    def finish(self) -> None:
        """Let go: what follows is a step of its own."""
        self._session.end_merge()

    def cancel(self) -> None:
        """Put everything back as it was when the face was caught."""
        self._session.end_merge()
        # A way that ended where it began has left no step.
        if self._session.document != self._start:
            self._session.undo(self._initiator)
