//! Rows of text set in columns: the first to the left, the others to the right. Knows nothing of what they say.

const GAP: &str = "   ";

/// The rows as lines, each column as wide as its widest cell; rows may have fewer cells than others.
pub(super) fn align(rows: &[Vec<String>]) -> String {
    let widths = widths(rows);
    let mut text = String::new();
    for row in rows {
        let cells = row.iter().zip(&widths).enumerate().map(|(column, (cell, width))| {
            let room = " ".repeat(width - cell.chars().count());
            if column == 0 { format!("{cell}{room}") } else { format!("{room}{cell}") }
        });
        let line = cells.collect::<Vec<_>>().join(GAP);
        text.push_str(line.trim_end());
        text.push('\n');
    }
    text
}

fn widths(rows: &[Vec<String>]) -> Vec<usize> {
    let columns = rows.iter().map(Vec::len).max().unwrap_or(0);
    let width = |column| {
        rows.iter().filter_map(|row| row.get(column)).map(|cell: &String| cell.chars().count()).max()
    };
    (0..columns).map(|column| width(column).unwrap_or(0)).collect()
}

#[cfg(test)]
mod tests {
    use super::align;

    #[test]
    fn exact_columns_are_aligned() {
        let rows = [vec!["a".into(), "12".into(), "x".into()], vec!["bcd".into(), "3".into()]];
        assert_eq!(align(&rows), "a     12   x\nbcd    3\n");
        assert_eq!(align(&[]), "");
    }
}
