"""The wire: generated messages, and one translator between them and the documents.

Rules of this room:

- The translator knows no field by name. It walks the descriptors, and what a message *is* follows from its form: a
  message whose only content is the oneof ``value`` is that value, one whose only field is ``entries`` is that list or
  table, ``Numbers`` is a nested list with None where a number is not known; every other message is a table.
- A key that is there and null is left out of its message like one that is not there; where that would change the
  meaning, a field ``absent`` names such keys.
- Documents are plain values here, as JSON has them; floats travel as they are, so that every bit arrives.
- A message from outside that holds a field unknown to us is refused as a whole, however deep the field lies: what was
  understood only in half must never be answered.
"""

from __future__ import annotations

from barnwright.wire.decode import decode, parse
from barnwright.wire.encode import encode
from barnwright.wire.unknown import refuse_unknown

__all__ = ["decode", "encode", "parse", "refuse_unknown"]
