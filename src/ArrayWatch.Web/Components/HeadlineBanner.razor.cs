using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Components;

/// <summary>The most important fact of a page, first and biggest.</summary>
public partial class HeadlineBanner : ComponentBase
{
    [Parameter, EditorRequired]
    public Headline Headline { get; set; } = null!;
}
