"""The panel of conditions: rain, ice, heat, another coat, without an edit of any stack."""
