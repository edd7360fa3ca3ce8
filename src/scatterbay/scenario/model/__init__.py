"""The file as it is written: pydantic models, one per part of it, in the author's own keys.

Pydantic is imported here and nowhere else. What leaves this package are plain records that ``build`` turns
into the dataclasses of ``parts``.
"""
