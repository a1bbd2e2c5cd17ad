//! Text with a unit ⇄ SI; units exist only here.
