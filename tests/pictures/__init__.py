"""Pictures for people: ``python -m tests.pictures FOLDER`` draws every sample, ``--readme`` those of the README.

Each is made by the command ``slabwright picture`` in a process of its own, as a user would make it.
"""
