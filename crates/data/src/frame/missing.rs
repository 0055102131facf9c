//! Which cells stand for a missing value.

use super::number::parse_number;

/// The texts that stand for a missing value, beside a cell with nothing or only blanks in it.
#[derive(Clone, Debug)]
pub(crate) struct Missing {
    declared: Vec<String>,
    numbers: Vec<f64>,
    decimal: char,
}

impl Missing {
    pub(crate) fn new(declared: &[String], decimal: char) -> Self {
        let declared: Vec<String> = declared.iter().map(|text| text.trim().to_owned()).collect();
        let number =
            |text: &String| parse_number(text, decimal).or_else(|_| parse_number(text, '.')).ok();
        let numbers = declared.iter().filter_map(number).collect();
        Self { declared, numbers, decimal }
    }

    /// Whether a cell stands for a missing value. Blanks around it don't count, and a declared number
    /// stands for every way of writing it: -9 also for -9.00.
    pub(crate) fn includes(&self, cell: &str) -> bool {
        let cell = cell.trim();
        if cell.is_empty() || self.declared.iter().any(|text| text == cell) {
            return true;
        }
        !self.numbers.is_empty()
            && parse_number(cell, self.decimal).is_ok_and(|number| self.numbers.contains(&number))
    }

    /// What was declared.
    pub(crate) fn declared(&self) -> &[String] {
        &self.declared
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_declared_number_stands_for_every_way_of_writing_it() {
        let missing = Missing::new(&["-9".to_owned(), "NA".to_owned()], '.');
        for cell in ["", "  ", "\u{a0}", "-9", "-9.0", " -9.00 ", "\u{2212}9", "NA", " NA"] {
            assert!(missing.includes(cell), "{cell:?}");
        }
        for cell in ["9", "-99", "na", "N A", "NAN"] {
            assert!(!missing.includes(cell), "{cell:?}");
        }
    }
}
