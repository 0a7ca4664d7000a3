-- Whether the line was steady in a window and the effect not being cleaned; null: not judged, or computed before this was.
ALTER TABLE effect_window ADD COLUMN steady boolean;
