namespace RiskWorker.Reporting.Pdf;

/// <summary>A fragment and its distance from the top of the page's body.</summary>
internal readonly record struct Placed(Fragment Fragment, float Y);

/// <summary>Spreads fragments over pages: chains that want to stay together do, where a page can hold them.</summary>
internal sealed class Paginator(float height)
{
    private readonly List<List<Placed>> pages = [[]];
    private float y;

    private bool AtTop => pages[^1].Count == 0;

    public IReadOnlyList<IReadOnlyList<Placed>> Place(IReadOnlyList<Fragment> fragments)
    {
        for (var first = 0; first < fragments.Count;)
        {
            var end = ChainEnd(fragments, first);
            if (Wants(fragments, first, end))
                NewPage();
            for (; first < end; first++)
                Put(fragments[first]);
        }

        if (pages.Count > 1 && AtTop)
            pages.RemoveAt(pages.Count - 1);
        return pages;
    }

    private static int ChainEnd(IReadOnlyList<Fragment> fragments, int first)
    {
        var end = first;
        while (end < fragments.Count - 1 && fragments[end].KeepWithNext && !fragments[end + 1].StartsPage)
            end++;

        return end + 1;
    }

    // A chain too long for any page is not worth an empty foot: it begins here and breaks where it must.
    private bool Wants(IReadOnlyList<Fragment> fragments, int first, int end)
    {
        if (fragments[first].StartsPage)
            return !AtTop;

        var extent = 0f;
        for (var i = first; i < end; i++)
            extent += fragments[i].Extent;

        var alone = extent - fragments[first].SpaceBefore + (fragments[first].Repeat?.Height ?? 0);
        return !AtTop && y + extent > height && alone <= height;
    }

    private void Put(Fragment fragment)
    {
        if (!AtTop && y + fragment.Extent > height)
            NewPage();

        if (fragment.Height == 0)
        {
            y += AtTop ? 0 : fragment.SpaceBefore;
            return;
        }

        if (AtTop && fragment.Repeat is { } head)
            Add(head, 0);
        Add(fragment, AtTop ? 0 : fragment.SpaceBefore);
    }

    private void Add(Fragment fragment, float space)
    {
        pages[^1].Add(new Placed(fragment, y + space));
        y += space + fragment.Height;
    }

    private void NewPage()
    {
        pages.Add([]);
        y = 0;
    }
}
