"""Lines of all processes, each with its name, in whole lines only."""

from pathlib import Path

from service.start.log_follower import LogFollower


def test_only_what_comes_after_the_beginning_is_shown_and_only_in_whole_lines(tmp_path: Path, capsys):
    log = tmp_path / "web.log"
    log.write_text("from yesterday\n")
    follower = LogFollower()
    follower.follow("web", log)

    with log.open("a") as out:
        out.write("one\ntw")
    follower.show_new()
    with log.open("a") as out:
        out.write("o\n")
    follower.show_new()

    follower.stop()
    assert capsys.readouterr().out == "web       | one\nweb       | two\n"


def test_bytes_that_are_no_text_do_not_stop_it(tmp_path: Path, capsys):
    follower = LogFollower()
    follower.follow("worker", tmp_path / "worker.log")
    (tmp_path / "worker.log").write_bytes(b"\xff\xfe\n")

    follower.stop()

    assert capsys.readouterr().out.startswith("worker    | ")


def test_a_log_that_has_grown_large_is_put_aside(tmp_path: Path, monkeypatch):
    monkeypatch.setattr("service.start.log_follower._LARGE", 10)
    (tmp_path / "web.log").write_text("x" * 11)
    follower = LogFollower()

    follower.follow("web", tmp_path / "web.log")

    follower.stop()
    assert (tmp_path / "web.old.log").stat().st_size == 11
    assert (tmp_path / "web.log").stat().st_size == 0
