//! The samples are what their generator writes, their pages tell the truth, and their troubles are there.

#[path = "../examples/generate_samples/scenario/mod.rs"]
mod scenario;

use tussock_data::frame::{Frame, Kind};
use tussock_data::read::{ReadOptions, read_bytes};
use tussock_data::samples::{Sample, sample, samples};

fn table(sample: &Sample) -> Frame {
    read_bytes(sample.text.as_bytes(), ',', &ReadOptions::default())
        .expect("samples are well formed")
}

fn missing(frame: &Frame, column: &str) -> usize {
    let cells = frame.texts(column).expect("the column exists");
    cells.iter().filter(|cell| cell.is_none()).count()
}

#[test]
fn every_table_is_what_its_generator_writes() {
    let written: Vec<(&str, String)> =
        samples().iter().map(|sample| (sample.name, sample.text.to_owned())).collect();
    assert!(written == scenario::tables(), "run the example `generate_samples` of this crate");
}

#[test]
fn every_page_starts_with_the_name_and_the_summary_and_says_that_the_data_is_invented() {
    for sample in samples() {
        let start = format!("# {}\n\n{}\n\n", sample.name, sample.summary);
        assert!(sample.page.starts_with(&start), "{}", sample.name);
        assert!(
            sample.page.contains("every number are invented")
                || sample.page.contains("Every number is invented")
        );
        assert!(sample.page.contains(&format!("read sample {} as ", sample.name)));
    }
}

#[test]
fn every_page_lists_the_columns_of_the_table_in_order() {
    for sample in samples() {
        let columns: Vec<String> = sample
            .page
            .lines()
            .filter(|line| line.starts_with("| `"))
            .filter_map(|line| line.split('|').nth(1))
            .flat_map(|cell| cell.split(','))
            .map(|name| name.trim().trim_matches('`').to_owned())
            .collect();
        assert_eq!(columns, table(sample).names(), "{}", sample.name);
    }
}

#[test]
fn a_sample_is_found_by_its_name() {
    assert_eq!(sample("basil").map(|sample| sample.name), Some("basil"));
    assert_eq!(sample("Basil"), None);
}

#[test]
fn the_ferry_has_the_troubles_that_its_page_tells() {
    let frame = table(sample("ferry").unwrap());
    assert_eq!(frame.rows(), 180);
    let roster = frame.factor("roster").unwrap();
    assert_eq!(roster.levels, ["Forward ", "backward", "fixed", "forward"]);
    let of = |level| roster.codes.iter().filter(|code| **code == Some(level)).count();
    assert_eq!([of(0), of(1), of(2), of(3)], [3, 57, 52, 68]);
    assert_eq!(frame.levels("ship").unwrap(), ["Auk", "Gannet", "Petrel", "Tern"]);

    let counts =
        ["baseline", "alertness", "mood", "lapses", "sleep"].map(|column| missing(&frame, column));
    assert_eq!(counts, [2, 0, 2, 1, 3]);
    let few = frame.numbers("watches").unwrap().iter().filter(|watches| **watches < 8.0).count();
    assert_eq!(few, 8);

    let mood = frame.numbers("mood").unwrap();
    let mut known: Vec<f64> = mood.into_iter().filter(|mood| !mood.is_nan()).collect();
    known.sort_by(f64::total_cmp);
    assert_eq!(known.first(), Some(&6.3));
    assert!(known.get(1).is_some_and(|second| *second > 20.0), "one mood is out of line");
}

#[test]
fn columns_of_the_samples_are_numbers_where_they_should_be() {
    for (name, texts) in [
        ("ferry", vec!["crew", "ship", "roster"]),
        ("ferry_waves", vec!["crew", "roster"]),
        ("basil", vec!["pot", "bench", "substrate"]),
    ] {
        let frame = table(sample(name).unwrap());
        for column in frame.names() {
            let expected = if texts.contains(&column.as_str()) { Kind::Text } else { Kind::Number };
            assert_eq!(frame.kind(&column), Some(expected), "{name}.{column}");
        }
    }
}

#[test]
fn crew_who_left_are_missing_in_all_later_waves() {
    let frame = table(sample("ferry_waves").unwrap());
    for measure in ["alertness", "mood"] {
        let [a, b, c] =
            ["a", "b", "c"].map(|wave| frame.numbers(&format!("{measure}_{wave}")).unwrap());
        assert!(a.iter().all(|value| !value.is_nan()));
        assert!(b.iter().zip(&c).all(|(b, c)| !b.is_nan() || c.is_nan()));
        assert!(
            c.iter().filter(|value| value.is_nan()).count()
                > b.iter().filter(|value| value.is_nan()).count()
        );
    }
}

#[test]
fn the_basil_has_few_plants_a_substrate() {
    let frame = table(sample("basil").unwrap());
    let substrate = frame.factor("substrate").unwrap();
    let counts: Vec<usize> = (0..substrate.levels.len())
        .map(|level| substrate.codes.iter().filter(|code| **code == Some(level)).count())
        .collect();
    assert_eq!(
        (substrate.levels, counts),
        (vec!["bark".into(), "coir".into(), "peat".into()], vec![7, 7, 8])
    );
}
