namespace GeoCulvert.Report;

/// <summary>The caution that every page, sheet and schedule row carries.</summary>
public static class ReportCaution
{
    /// <summary>In full, for the page and the sheets.</summary>
    public const string Text =
        "Screening and design aid. The rules of the local agency come first; a licensed engineer must review every figure before it is built.";

    /// <summary>In short, for a table cell.</summary>
    public const string Short = "Screening and design aid; local rules come first; needs a licensed engineer's review.";
}
