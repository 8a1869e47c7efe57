"""What a load that moves along a line of a member must be able to say, and the coordinate that steps it."""

from __future__ import annotations

from typing import Protocol

from linkcalc.parts.pose import Poses, Value


class Moved(Protocol):
    """A pusher that stands along a line, where the poses' ``places`` say.

    place  [m] how far along it stands as drawn; span  [m] the length of the line
    """

    @property
    def place(self) -> Value: ...
    @property
    def span(self) -> Value: ...


class Standing(Protocol):
    """A coordinate that moves no member, but a load: the mechanism stands as drawn while it is stepped. Its part and
    itself say ``stands = True``.

    kind  "length"; span  [m] how far it may go, from nothing
    """

    @property
    def kind(self) -> str: ...
    @property
    def span(self) -> Value: ...

    def value(self, at: Poses) -> Value:
        """[m]"""

    def put(self, at: Poses, place: Value) -> Poses:
        """the same poses with another value of it"""
