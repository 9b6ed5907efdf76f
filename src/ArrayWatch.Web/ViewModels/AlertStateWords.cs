using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>States and priorities of an alert in words, and what a person can do in each state.</summary>
internal static class AlertStateWords
{
    public static string Word(AlertState state) => state switch
    {
        AlertState.Unacknowledged => "standing, nobody has acknowledged",
        AlertState.Acknowledged => "standing, acknowledged",
        AlertState.ReturnedUnacknowledged => "gone, nobody has acknowledged",
        AlertState.Normal => "gone, back to normal",
        AlertState.Shelved => "shelved: put aside for a time",
        AlertState.SuppressedByDesign => "held back under a wider alert",
        _ => "out of service for maintenance",
    };

    /// <summary>The state as the interface for programs spells it.</summary>
    public static string Key(AlertState state) => state switch
    {
        AlertState.Unacknowledged => "unacknowledged",
        AlertState.Acknowledged => "acknowledged",
        AlertState.ReturnedUnacknowledged => "returned-unacknowledged",
        AlertState.Normal => "normal",
        AlertState.Shelved => "shelved",
        AlertState.SuppressedByDesign => "suppressed-by-design",
        _ => "out-of-service",
    };

    public static AlertState? Parse(string key) =>
        Enum.GetValues<AlertState>().Where(s => Key(s) == key).Select(static s => (AlertState?)s).FirstOrDefault();

    public static string Word(AlertPriority priority) => priority switch
    {
        AlertPriority.High => "act now",
        AlertPriority.Medium => "act this watch",
        _ => "act when convenient",
    };

    public static string Style(AlertPriority priority) => priority switch
    {
        AlertPriority.High => "high",
        AlertPriority.Medium => "medium",
        _ => "low",
    };

    /// <summary>True while the fault itself stands, whatever a person has done about the alert.</summary>
    public static bool Stands(AlertEvent alert) => alert.Returned is null && alert.State is not AlertState.Normal;

    public static bool NeedsAcknowledging(AlertState state) => state is AlertState.Unacknowledged or AlertState.ReturnedUnacknowledged;

    public static bool CanShelve(AlertState state) => state is AlertState.Unacknowledged or AlertState.Acknowledged;

    public static bool CanTakeOutOfService(AlertState state) => state is not (AlertState.Normal or AlertState.SuppressedByDesign);
}
