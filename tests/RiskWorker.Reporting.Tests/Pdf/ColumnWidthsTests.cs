using RiskWorker.Reporting.Pdf;

namespace RiskWorker.Reporting.Tests.Pdf;

public sealed class ColumnWidthsTests
{
    [Fact]
    public void Share_with_room_follows_the_weights() => Assert.Equal([30f, 70f], ColumnWidths.Share([3, 7], [10, 10], 100));

    [Fact]
    public void Share_gives_a_needy_column_what_it_needs() => Assert.Equal([60f, 20f, 20f], ColumnWidths.Share([1, 1, 1], [60, 5, 5], 100));

    [Fact]
    public void Share_holds_a_second_column_that_the_first_pushes_below_its_need() =>
        Assert.Equal([60f, 30f, 10f], ColumnWidths.Share([1, 1, 1], [60, 30, 5], 100));

    [Fact]
    public void Share_of_too_little_shrinks_all_alike() => Assert.Equal([75f, 25f], ColumnWidths.Share([1, 1], [150, 50], 100));
}
